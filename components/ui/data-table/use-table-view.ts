'use client';

import { useSearchParams } from 'next/navigation';
import { useEffect, useState } from 'react';
import type { TableView } from './column';

/** Browsers refuse more than some hundred changes of the address in half a minute. */
const QUIET_MS = 250;

export function readView(search: URLSearchParams, facetIds: readonly string[]): TableView {
  const sort = search.get('sort');
  const facets = facetIds.flatMap((id) => {
    const value = search.get(id);
    return value === null ? [] : [[id, value] as const];
  });
  return {
    words: search.get('find') ?? '',
    sort: sort ? { id: sort.replace(/^-/, ''), isDescending: sort.startsWith('-') } : null,
    facets: Object.fromEntries(facets),
  };
}

/** The view in an address, beside whatever else the address holds. */
export function writeView(
  search: URLSearchParams,
  { words, sort, facets }: TableView,
  facetIds: readonly string[],
): URLSearchParams {
  const next = new URLSearchParams(search);
  const set = (key: string, value: string) =>
    value === '' ? next.delete(key) : next.set(key, value);
  set('find', words.trim());
  set('sort', sort === null ? '' : `${sort.isDescending ? '-' : ''}${sort.id}`);
  for (const id of facetIds) set(id, facets[id] ?? '');
  return next;
}

/**
 * The view of a table, begun from the address and kept there.
 *
 * @param facetIds also the keys in the address
 * @param isInAddress false where a page has several tables: the view is then only here
 */
export function useTableView(
  facetIds: readonly string[],
  isInAddress: boolean,
): [TableView, (change: Partial<TableView>) => void] {
  const search = useSearchParams();
  const [view, setView] = useState<TableView>(() =>
    readView(
      isInAddress ? new URLSearchParams(search?.toString()) : new URLSearchParams(),
      facetIds,
    ),
  );
  const keys = facetIds.join();
  useEffect(() => {
    if (!isInAddress) return;
    const timer = setTimeout(() => {
      const { pathname, search: held, hash } = window.location;
      const next = writeView(new URLSearchParams(held), view, keys === '' ? [] : keys.split(','));
      const text = next.toString();
      if (text === new URLSearchParams(held).toString()) return;
      window.history.replaceState(null, '', `${pathname}${text === '' ? '' : `?${text}`}${hash}`);
    }, QUIET_MS);
    return () => clearTimeout(timer);
  }, [view, isInAddress, keys]);
  return [view, (change) => setView((before) => ({ ...before, ...change }))];
}
