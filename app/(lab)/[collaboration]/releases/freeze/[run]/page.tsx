import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { FreezeScreen } from '@/components/releases/freeze-screen';
import type { Actor } from '@/lib/access/actor';
import { may, rolesThatMay } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { listMembers } from '@/lib/services/members';
import { getFreezeStanding } from '@/lib/services/releases/freeze';
import { listGuestLinks } from '@/lib/services/releases/guest-links';
import { getRun } from '@/lib/services/runs';

export const metadata: Metadata = { title: 'Freeze' };

async function findStanding(actor: Actor, run: string) {
  try {
    return { standing: await getFreezeStanding(actor, run), view: await getRun(actor, run) };
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}

/** Members who may freeze a run; nobody in an archived collaboration. */
async function freezers(actor: Actor): Promise<{ id: string; name: string }[]> {
  if (actor.isArchived) return [];
  const allowed = rolesThatMay('freeze-run');
  const { members } = await listMembers(actor);
  return members
    .filter(
      ({ roles, suspendedAt }) => !suspendedAt && roles.some((role) => allowed.includes(role)),
    )
    .map(({ person: { id, name } }) => ({ id, name }));
}

export default async function FreezePage({
  params,
}: {
  params: Promise<{ collaboration: string; run: string }>;
}) {
  const { collaboration, run } = await params;
  const actor = await currentActor(collaboration);
  const { standing, view } = await findStanding(actor, run);
  if (!view.result) notFound();
  const { links } = await listGuestLinks(actor);
  const mayFreeze = may(actor, 'freeze-run');
  return (
    <FreezeScreen
      collaboration={actor.collaboration}
      initial={standing}
      sentence={view.result.statement.sentence}
      conditions={view.result.statement.conditions}
      canRelease={mayFreeze}
      links={links}
      askable={mayFreeze ? [] : await freezers(actor)}
    />
  );
}
