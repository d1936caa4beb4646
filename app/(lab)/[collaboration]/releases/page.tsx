import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ReleasesScreen } from '@/components/releases/releases-screen';
import { may } from '@/lib/access/permissions';
import { listReleases } from '@/lib/services/releases/describe';
import { listGuestLinks } from '@/lib/services/releases/guest-links';
import { listImports } from '@/lib/services/releases/import-bundle';

export const metadata: Metadata = { title: 'Releases' };

export default async function ReleasesPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [{ releases }, { links }, { imports }] = await Promise.all([
    listReleases(actor),
    listGuestLinks(actor),
    listImports(actor),
  ]);
  return (
    <ReleasesScreen
      collaboration={actor.collaboration}
      releases={releases}
      links={links}
      imports={imports}
      can={{
        freeze: may(actor, 'freeze-run'),
        bring: may(actor, 'create-survey'),
        link: may(actor, 'link-guest'),
      }}
    />
  );
}
