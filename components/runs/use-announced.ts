'use client';

import { useEffect, useState } from 'react';

const QUIET_MS = 1000;

/** A text for readers of the screen: said once it has been still for a second, never in between. */
export function useAnnounced(text: string): string {
  const [said, setSaid] = useState('');
  useEffect(() => {
    const timer = setTimeout(() => setSaid(text), QUIET_MS);
    return () => clearTimeout(timer);
  }, [text]);
  return said;
}
