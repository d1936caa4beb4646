import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { AskLinkForm } from '@/components/people/ask-link-form';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { ResetForm } from '@/components/people/reset-form';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { readLink } from '@/lib/services/account-links';

export const metadata: Metadata = { title: 'Set a new password', referrer: 'no-referrer' };

export default async function ResetPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const email = await readLink(code, 'password-reset');
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>{email === null ? 'This link is over' : 'Set a new password'}</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        {email === null
          ? 'It was used, has expired or was replaced by a newer one. Ask for another.'
          : 'Wherever you are signed in, you sign in again with the new one.'}
      </p>
      {email === null ? (
        <AskLinkForm purpose="password-reset" />
      ) : (
        <ResetForm code={code} email={email} />
      )}
    </Entrance>
  );
}
