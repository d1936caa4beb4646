import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { currentPerson } from '@/app/session';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { JoinForm } from '@/components/people/join-form';
import { LinkButton } from '@/components/ui/link-button';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { LabError } from '@/lib/errors';
import { getOffer } from '@/lib/services/invitations';

export const metadata: Metadata = { title: 'Invitation' };

async function findOffer(code: string) {
  try {
    return await getOffer(code);
  } catch (error) {
    if (error instanceof LabError) return null;
    throw error;
  }
}

export default async function JoinPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const [offer, person] = await Promise.all([findOffer(code), currentPerson()]);
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      {offer === null ? (
        <>
          <EntranceTitle>This invitation is not open</EntranceTitle>
          <p className="mt-3 mb-6 text-[15px] text-ink3">
            It was used, taken back, or is older than 14 days. Ask whoever invited you for a new
            one.
          </p>
          <LinkButton href="/sign-in">Sign in</LinkButton>
        </>
      ) : (
        <>
          <EntranceTitle>Join {offer.collaboration}</EntranceTitle>
          <p className="mt-3 mb-6 text-[15px] text-ink3">
            {offer.invitedBy ?? 'An owner'} invites {offer.email} as {offer.roles.join(' and ')}.
          </p>
          <JoinForm code={code} offer={offer} signedInAs={person?.email ?? null} />
        </>
      )}
    </Entrance>
  );
}
