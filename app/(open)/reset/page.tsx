import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { AskLinkForm } from '@/components/people/ask-link-form';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';

export const metadata: Metadata = { title: 'Set a new password' };

export default async function AskResetPage() {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Set a new password</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        A link comes by e-mail. Until it is used, your old password holds.
      </p>
      <AskLinkForm purpose="password-reset" />
    </Entrance>
  );
}
