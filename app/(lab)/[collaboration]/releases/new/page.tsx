import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ReleaseForm } from '@/components/releases/release-form';
import { PageTitle } from '@/components/ui/page-title';
import { readOwnOrcid } from '@/lib/services/orcid';
import { listReleases } from '@/lib/services/releases/describe';
import { listFrozenRuns } from '@/lib/services/releases/frozen-runs';

export const metadata: Metadata = { title: 'New release' };

interface PageProps {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<{ run?: string }>;
}

export default async function NewReleasePage({ params, searchParams }: PageProps) {
  const actor = await currentActor((await params).collaboration);
  const [choices, { releases }, orcid] = await Promise.all([
    listFrozenRuns(actor),
    listReleases(actor),
    readOwnOrcid(actor),
  ]);
  const { run } = await searchParams;
  const chosen = choices.find(({ id }) => id === run);
  return (
    <>
      <PageTitle
        title="New release"
        crumbs={[{ href: `/${actor.collaboration}/releases`, label: 'Releases' }, { label: 'New' }]}
        context="A draft first: nobody outside reads it before both have signed and it was run again."
      />
      <ReleaseForm
        collaboration={actor.collaboration}
        choices={choices}
        published={releases.filter(({ state, replacedBy }) => state === 'published' && !replacedBy)}
        initial={{
          title: chosen?.analysisName ?? '',
          authors: [{ name: actor.personName, ...(orcid === null ? {} : { orcid }) }],
          abstract: '',
          licence: 'CC-BY-4.0',
          note: '',
          runIds: chosen ? [chosen.id] : [],
          replacesId: null,
        }}
      />
    </>
  );
}
