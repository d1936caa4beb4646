import type { Metadata } from 'next';
import { currentActor, requirePerson } from '@/app/session';
import { MeScreen } from '@/components/settings/me/me-screen';
import { OrcidSection } from '@/components/settings/me/orcid-section';
import { SecondFactorSection } from '@/components/settings/me/second-factor-section';
import { config } from '@/lib/config';
import { getMailPreferences } from '@/lib/services/mail';
import { readOwnOrcid } from '@/lib/services/orcid';
import { readSecondFactor } from '@/lib/services/second-factor';
import { listSessions } from '@/lib/services/sessions';

export const metadata: Metadata = { title: 'You' };

interface MePageProps {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<{ orcid?: string | string[] }>;
}

export default async function MePage({ params, searchParams }: MePageProps) {
  await currentActor((await params).collaboration);
  const person = await requirePerson();
  const [{ sessions }, mail, orcid, factor, { orcid: outcome }] = await Promise.all([
    listSessions(person),
    getMailPreferences(person),
    readOwnOrcid(person),
    readSecondFactor(person),
    searchParams,
  ]);
  return (
    <MeScreen name={person.personName} email={person.email} sessions={sessions} mail={mail}>
      <SecondFactorSection initial={factor} />
      <OrcidSection
        initial={orcid}
        isOffered={config().orcid !== null}
        outcome={outcome === 'linked' || outcome === 'taken' ? outcome : null}
      />
    </MeScreen>
  );
}
