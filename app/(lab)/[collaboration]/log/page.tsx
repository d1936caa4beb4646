import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { LogScreen } from '@/components/log/log-screen';
import { NotAllowed } from '@/components/settings/not-allowed';
import { may } from '@/lib/access/permissions';
import { config } from '@/lib/config';
import { auditQuerySchema } from '@/lib/schemas/audit';
import { auditChoices, listAudit } from '@/lib/services/audit';

export const metadata: Metadata = { title: 'Log' };

const PAGE_SIZE = 100;

/** The first moment of a day in UTC, and of the day after. */
function momentOf(day: string | undefined, daysLater: number): string | undefined {
  const at = day === undefined ? Number.NaN : Date.parse(`${day}T00:00:00Z`);
  return Number.isNaN(at) ? undefined : new Date(at + daysLater * 86_400_000).toISOString();
}

export default async function LogPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  if (!may(actor, 'read-audit')) {
    return (
      <NotAllowed
        title="Log"
        fact="Only an owner can read the log."
        instead="What happened in the collaboration, as far as it concerns everybody, stands under Activity."
        link={{ href: `/${actor.collaboration}/activity`, label: 'Open the activity' }}
      />
    );
  }
  const { action, person, item, from, to, offset } = await searchParams;
  const apiFilter = { action, person, item, from: momentOf(from, 0), to: momentOf(to, 1) };
  const asked = auditQuerySchema.safeParse({ ...apiFilter, offset, limit: PAGE_SIZE });
  const query = asked.success ? asked.data : auditQuerySchema.parse({ limit: PAGE_SIZE });
  const [page, choices] = await Promise.all([listAudit(actor, query), auditChoices(actor)]);
  return (
    <LogScreen
      collaboration={actor.collaboration}
      page={page}
      filter={asked.success ? { action, person, item, from, to } : {}}
      apiFilter={asked.success ? apiFilter : {}}
      offset={query.offset}
      pageSize={PAGE_SIZE}
      choices={choices}
      knowsAddresses={config().isBehindProxy}
    />
  );
}
