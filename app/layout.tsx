import '@fontsource/source-sans-3/300.css';
import '@fontsource/source-sans-3/400.css';
import '@fontsource/source-sans-3/400-italic.css';
import '@fontsource/source-sans-3/600.css';
import '@fontsource/source-sans-3/700.css';
import './globals.css';
import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { preload } from 'react-dom';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { firstFonts } from './fonts';

export const metadata: Metadata = {
  title: { default: 'Rarebound', template: '%s, Rarebound' },
  description: 'Occurrence rates from direct-imaging surveys, star by star',
  icons: { icon: [{ url: '/mark.svg', type: 'image/svg+xml' }] },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#f6fbfa' },
    { media: '(prefers-color-scheme: dark)', color: '#0c181a' },
  ],
};

/** A page built ahead carries no nonce, and the content policy would then stop its scripts. */
export const dynamic = 'force-dynamic';

/**
 * The theme travels in a cookie and is written into the first byte of the page, so no script has
 * to run before the first paint; without a cookie the style sheet follows the system.
 */
export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  for (const font of firstFonts) {
    preload(font, { as: 'font', type: 'font/woff2', crossOrigin: 'anonymous' });
  }
  return (
    <html lang="en-GB" data-theme={theme === 'system' ? undefined : theme}>
      <body>{children}</body>
    </html>
  );
}
