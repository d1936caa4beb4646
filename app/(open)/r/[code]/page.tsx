import type { Metadata } from 'next';
import { cookies, headers } from 'next/headers';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { GuestNotes } from '@/components/releases/guest-notes';
import { OpenFrame } from '@/components/releases/open-frame';
import { ReleasePage } from '@/components/releases/release-page';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { addressOf, countAttempt } from '@/lib/access/attempts';
import { NotFound } from '@/lib/errors';
import { isGuestToken, readAsGuest } from '@/lib/services/releases/guest-links';
import { findPublicRelease } from '@/lib/services/releases/public-page';

interface PageProps {
  params: Promise<{ code: string }>;
}

/** A public release, or what a guest's link opens; looked up once a page. */
const findPage = cache(async (code: string) => {
  await countAttempt('anonymous-requests', addressOf(await headers()), 'Too many requests.');
  try {
    return isGuestToken(code)
      ? { page: await readAsGuest(code), token: code }
      : { page: await findPublicRelease(code) };
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
});

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { code } = await params;
  const { page } = await findPage(code);
  // Whoever follows a private link must not tell a search engine of it.
  const robots = isGuestToken(code) ? { index: false, follow: false } : undefined;
  return { title: page.title, description: page.abstract || undefined, robots };
}

export default async function OpenReleasePage({ params }: PageProps) {
  const found = await findPage((await params).code);
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <OpenFrame theme={theme}>
      <ReleasePage page={found.page} />
      {found.token !== undefined && <GuestNotes token={found.token} guest={found.page.guest} />}
    </OpenFrame>
  );
}
