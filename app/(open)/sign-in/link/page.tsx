import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { AskLinkForm } from '@/components/people/ask-link-form';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';

export const metadata: Metadata = { title: 'Sign in by a link' };

export default async function AskSignInLinkPage() {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Sign in by a link</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        It comes by e-mail and signs in the browser in which it is opened.
      </p>
      <AskLinkForm purpose="sign-in" />
    </Entrance>
  );
}
