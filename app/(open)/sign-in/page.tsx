import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/app/session';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { SignInForm } from '@/components/people/sign-in-form';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';

export const metadata: Metadata = { title: 'Sign in' };

/** Only addresses of this site: one slash, then anything but a second slash or a backslash. */
const isOwnAddress = (text: string) => /^\/(?![/\\])/.test(text);

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<{ next?: string | string[] }>;
}) {
  const { next } = await searchParams;
  const target = typeof next === 'string' && isOwnAddress(next) ? next : '/';
  if (await currentPerson()) redirect(target);
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Limits that say what they rest on</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        Occurrence rates from direct-imaging surveys, star by star, with every age, curve and prior
        on record.
      </p>
      <SignInForm next={target} />
    </Entrance>
  );
}
