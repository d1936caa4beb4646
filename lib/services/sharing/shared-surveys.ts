import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { Conflict } from '@/lib/errors';
import type { SharedFrom } from '@/lib/schemas/sharing';
import { inTransaction, ShareRow, type SurveyRow } from '@/models';
import { collectContent } from './content';

/** Whether nothing new may rest on what was shared. */
export const isWithdrawn = ({ withdrawnFrom }: Pick<ShareRow, 'withdrawnFrom'>) =>
  withdrawnFrom !== null && withdrawnFrom <= new Date();

/**
 * Refuses a change of what another collaboration shares.
 *
 * @throws Conflict that names the owner
 */
export async function refuseShared(survey: Pick<SurveyRow, 'shareId' | 'name'>): Promise<void> {
  if (survey.shareId === null) return;
  const share = await ShareRow.findByPk(survey.shareId, { rejectOnEmpty: true });
  throw new Conflict(
    `${survey.name} is shared by ${share.ownerName} and read only here. Ask them to change it, then refresh the copy`,
  );
}

async function hasNewer(share: ShareRow): Promise<boolean> {
  const content = await inTransaction((transaction) => collectContent(share, transaction));
  return content !== null && content.version !== share.sourceVersion;
}

/** How a survey came here, where another collaboration owns it. */
export async function describeShared(
  actor: Actor,
  share: ShareRow,
  look: { forNewer: boolean },
): Promise<SharedFrom | undefined> {
  if (!share.sourceVersion || !share.copiedAt) return undefined;
  const isOver = share.state !== 'accepted';
  const isNewer = look.forNewer && !isOver ? await hasNewer(share) : null;
  return {
    shareId: share.id,
    owner: share.ownerName,
    scope: share.scope,
    attribution: share.attribution,
    version: share.sourceVersion,
    copiedAt: share.copiedAt.toISOString(),
    isWithdrawn: isWithdrawn(share),
    withdrawnFrom: share.withdrawnFrom?.toISOString() ?? null,
    withdrawnWhy: share.withdrawnWhy,
    hasNewer: isNewer,
    canRefresh: isNewer === true && may(actor, 'accept-survey'),
  };
}
