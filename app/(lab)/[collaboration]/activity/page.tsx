import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ActivityScreen } from '@/components/activity/activity-screen';
import { activityQuerySchema } from '@/lib/schemas/activity';
import { listActivity } from '@/lib/services/activity';
import { listMembers } from '@/lib/services/members';

export const metadata: Metadata = { title: 'Activity' };

export default async function ActivityPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { kind, person, item, for: whose } = await searchParams;
  const asked = activityQuerySchema.safeParse({ kind, person, item, for: whose });
  // An address that asks for nothing we know shows everything.
  const query = asked.success ? asked.data : activityQuerySchema.parse({});
  const [initial, { members }] = await Promise.all([
    listActivity(actor, query),
    listMembers(actor),
  ]);
  const filter = { kind: query.kind, person: query.person, item: query.item, for: query.for };
  return (
    <ActivityScreen
      key={JSON.stringify(filter)}
      collaboration={actor.collaboration}
      initial={initial}
      filter={filter}
      people={members.map((member) => member.person)}
    />
  );
}
