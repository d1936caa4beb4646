import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { draftOf } from '@/components/releases/release-draft';
import { ReleaseForm } from '@/components/releases/release-form';
import { PageTitle } from '@/components/ui/page-title';
import { listReleases } from '@/lib/services/releases/describe';
import { listFrozenRuns } from '@/lib/services/releases/frozen-runs';
import { foundRelease } from '../../found-release';

export const metadata: Metadata = { title: 'Change a release' };

interface PageProps {
  params: Promise<{ collaboration: string; release: string }>;
}

export default async function EditReleasePage({ params }: PageProps) {
  const { collaboration, release: key } = await params;
  const actor = await currentActor(collaboration);
  const release = await foundRelease(actor, key);
  if (!release.can.change) notFound();
  const [choices, { releases }] = await Promise.all([listFrozenRuns(actor), listReleases(actor)]);
  return (
    <>
      <PageTitle
        title={`Change ${release.key}`}
        crumbs={[
          { href: `/${actor.collaboration}/releases`, label: 'Releases' },
          { href: `/${actor.collaboration}/releases/${release.key}`, label: release.key },
          { label: 'Change' },
        ]}
      />
      <ReleaseForm
        collaboration={actor.collaboration}
        choices={choices}
        published={releases.filter(({ state, replacedBy }) => state === 'published' && !replacedBy)}
        initial={draftOf(release)}
        changed={{ id: release.id, key: release.key }}
      />
    </>
  );
}
