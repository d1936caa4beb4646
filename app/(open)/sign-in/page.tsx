import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/app/session';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { SignInForm } from '@/components/people/sign-in-form';
import { Notice } from '@/components/ui/notice';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { config } from '@/lib/config';

export const metadata: Metadata = { title: 'Sign in' };

const NOT_CONFIRMED =
  'ORCID did not confirm who you are. Try again, or sign in with your password.';

/** What brought the browser back here from ORCID. */
const orcidFaults: Record<string, string> = {
  OAuthSignin: 'ORCID does not answer just now. Sign in with your password.',
  OAuthCallback: NOT_CONFIRMED,
  Callback: NOT_CONFIRMED,
  OrcidDamaged: NOT_CONFIRMED,
  OrcidFault: 'Signing in with ORCID is not possible just now. Try again in a minute.',
  OrcidUnknown:
    'No account here is linked with this ORCID iD. Sign in another way, then link it on your own page.',
  OrcidSignedOut: 'Your session has ended, so the ORCID iD was not linked. Sign in, then link it.',
};

/** Only addresses of this site: one slash, then anything but a second slash or a backslash. */
const isOwnAddress = (text: string) => /^\/(?![/\\])/.test(text);

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<{ next?: string | string[]; error?: string | string[] }>;
}) {
  const { next, error } = await searchParams;
  const target = typeof next === 'string' && isOwnAddress(next) ? next : '/';
  if (await currentPerson()) redirect(target);
  const fault =
    typeof error === 'string' && Object.hasOwn(orcidFaults, error) ? orcidFaults[error] : undefined;
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Limits that say what they rest on</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        Occurrence rates from direct-imaging surveys, star by star, with every age, curve and prior
        on record.
      </p>
      {fault !== undefined && (
        <div className="mb-4">
          <Notice tone="bad" title={fault} />
        </div>
      )}
      <SignInForm next={target} hasOrcid={config().orcid !== null} />
    </Entrance>
  );
}
