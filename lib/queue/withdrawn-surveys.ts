import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { select } from './statement';

/**
 * Refuses surveys that their owners have taken back: runs that used them stand, nothing new may.
 *
 * @throws InputError that names each, its owner, the day and the reason
 */
export async function refuseWithdrawn(
  collaborationId: string,
  surveyIds: readonly string[],
  transaction?: Transaction,
): Promise<void> {
  const rows = await select<{ name: string; owner: string; day: string; why: string }>(
    `select s.name, x.owner_name as owner, x.withdrawn_why as why,
       to_char(x.withdrawn_from at time zone 'UTC', 'YYYY-MM-DD') as day
     from survey s join share x on x.id = s.share_id
     where s.collaboration_id = $1 and s.id = any($2::uuid[]) and x.withdrawn_from <= now()
     order by s.position`,
    [collaborationId, [...surveyIds]],
    transaction,
  );
  if (rows.length === 0) return;
  throw new InputError(
    rows.map(({ name, owner, day, why }) => ({
      code: 'survey-withdrawn',
      message: `${owner} took ${name} back on ${day}: ${why}. Earlier runs stand; nothing new may use it`,
    })),
  );
}
