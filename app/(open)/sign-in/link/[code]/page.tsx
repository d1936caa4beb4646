import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { AskLinkForm } from '@/components/people/ask-link-form';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { LinkSignIn } from '@/components/people/link-sign-in';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { readLink } from '@/lib/services/account-links';

export const metadata: Metadata = { title: 'Sign in', referrer: 'no-referrer' };

export default async function SignInLinkPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const email = await readLink(code, 'sign-in');
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>{email === null ? 'This link is over' : 'Sign in'}</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3 [overflow-wrap:anywhere]">
        {email === null
          ? 'It was used, has expired or was replaced by a newer one. Ask for another.'
          : `As ${email}, in this browser.`}
      </p>
      {email === null ? <AskLinkForm purpose="sign-in" /> : <LinkSignIn code={code} />}
    </Entrance>
  );
}
