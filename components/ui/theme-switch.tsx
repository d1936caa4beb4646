'use client';

import { useState } from 'react';
import { ConsequenceSwitch } from './consequence-switch';
import { Icon, type IconName } from './icon';
import { THEME_COOKIE, type Theme } from './theme';

const icons: Record<Theme, IconName> = { light: 'light', dark: 'dark', system: 'system' };
const oneYear = 31_536_000;

/** Keeps the choice in a cookie, so that the server writes it into the next page's first byte. */
export function ThemeSwitch({ initial }: { initial: Theme }) {
  const [theme, setTheme] = useState(initial);
  const choose = (next: Theme) => {
    setTheme(next);
    const root = document.documentElement;
    if (next === 'system') {
      delete root.dataset.theme;
      // biome-ignore lint/suspicious/noDocumentCookie: the Cookie Store API is not in every browser that we serve
      document.cookie = `${THEME_COOKIE}=; path=/; max-age=0; samesite=lax`;
    } else {
      root.dataset.theme = next;
      // biome-ignore lint/suspicious/noDocumentCookie: the Cookie Store API is not in every browser that we serve
      document.cookie = `${THEME_COOKIE}=${next}; path=/; max-age=${oneYear}; samesite=lax`;
    }
  };
  return (
    <ConsequenceSwitch<Theme>
      label="Light or dark"
      isLabelHidden
      size="small"
      value={theme}
      onChange={choose}
      options={(['light', 'dark', 'system'] as const).map((value) => ({
        value,
        label: (
          <span className="inline-flex items-center gap-1.5">
            <Icon name={icons[value]} size={14} />
            {value}
          </span>
        ),
      }))}
    />
  );
}
