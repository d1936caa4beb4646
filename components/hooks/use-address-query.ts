'use client';

import { useEffect, useRef } from 'react';

/** Browsers refuse more than some hundred changes of the address in half a minute. */
const QUIET_MS = 250;

/**
 * Keeps the unsaved setting in the address, so that a link shows a colleague the same view.
 *
 * The address is replaced once the setting has been still for a moment; nothing is fetched anew.
 */
export function useAddressQuery(query: Record<string, string>): void {
  const text = new URLSearchParams(query).toString();
  const isFirst = useRef(true);
  useEffect(() => {
    if (isFirst.current) {
      isFirst.current = false;
      return;
    }
    const timer = setTimeout(() => {
      const { pathname, hash } = window.location;
      window.history.replaceState(null, '', `${pathname}${text === '' ? '' : `?${text}`}${hash}`);
    }, QUIET_MS);
    return () => clearTimeout(timer);
  }, [text]);
}
