'use client';

import { useState } from 'react';
import { THEME_COOKIE, type Theme } from './theme';

const oneYear = 31_536_000;

/** The choice, and what changes it: kept in a cookie, so that the server writes it into the next page's first byte. */
export function useTheme(initial: Theme): [Theme, (next: Theme) => void] {
  const [theme, setTheme] = useState(initial);
  const choose = (next: Theme) => {
    setTheme(next);
    const root = document.documentElement;
    if (next === 'system') delete root.dataset.theme;
    else root.dataset.theme = next;
    const kept = next === 'system' ? '; max-age=0' : `${next}; max-age=${oneYear}`;
    // biome-ignore lint/suspicious/noDocumentCookie: the Cookie Store API is not in every browser that we serve
    document.cookie = `${THEME_COOKIE}=${kept}; path=/; samesite=lax`;
  };
  return [theme, choose];
}
