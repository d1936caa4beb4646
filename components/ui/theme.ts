export type Theme = 'light' | 'dark' | 'system';

export const THEME_COOKIE = 'theme';

export function readTheme(value: string | undefined): Theme {
  return value === 'light' || value === 'dark' ? value : 'system';
}
