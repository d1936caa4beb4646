import { Op } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { select } from '@/lib/queue/statement';
import { idSchema } from '@/lib/schemas/common';
import type { ShareState, Shares, ShareView } from '@/lib/schemas/sharing';
import { CollaborationRow, PersonRow, ShareRow, SurveyRow } from '@/models';
import { together } from '../together';

/** Where an offer stands now. */
export function stateOf(share: ShareRow): ShareState {
  const { state, copiedAt, withdrawnFrom, expiresAt } = share;
  if (state === 'withdrawn') {
    if (copiedAt === null) return 'taken-back';
    return withdrawnFrom && withdrawnFrom > new Date() ? 'ending' : 'withdrawn';
  }
  return state === 'offered' && expiresAt <= new Date() ? 'expired' : state;
}

/** What each source holds now. */
async function countSources(shares: ShareRow[]) {
  const rows = await select<{ id: string; targets: number; maps: number; curves: number }>(
    `select x.id, count(t.id)::int as targets,
       (count(t.id) filter (where t.map_state = 'ready'))::int as maps,
       (select count(*) from contrast_curve c join target o on o.id = c.target_id
         where x.scope = 'whole' and o.survey_id = x.survey_id and c.replaced_at is null)::int as curves
     from share x left join target t on t.survey_id = x.survey_id
     where x.id = any($1::uuid[]) and x.survey_id is not null group by x.id`,
    [shares.map(({ id }) => id)],
  );
  return new Map(rows.map(({ id, ...holds }) => [id, holds]));
}

/** What hangs on offers, whoever asks. */
async function readBehind(collaborationId: string, shares: ShareRow[]) {
  const people = shares.flatMap(({ offeredBy, decidedBy }) => [offeredBy, decidedBy]);
  const [receivers, persons, surveys, sources] = await Promise.all([
    CollaborationRow.findAll({ where: { id: shares.map(({ receiverId }) => receiverId) } }),
    PersonRow.findAll({ where: { id: people.filter((id) => id !== null) } }),
    SurveyRow.findAll({
      where: {
        collaborationId,
        [Op.or]: [
          { shareId: shares.map(({ id }) => id) },
          { id: shares.flatMap(({ surveyId }) => surveyId ?? []) },
        ],
      },
    }),
    countSources(shares),
  ]);
  const nameOf = new Map([...receivers, ...persons].map(({ id, name }) => [id, name]));
  return { shares, nameOf, surveys, sources };
}

type Behind = Awaited<ReturnType<typeof readBehind>>;

function describeShares(actor: Actor, { shares, nameOf, surveys, sources }: Behind): ShareView[] {
  const personName = (id: string | null) => nameOf.get(id ?? '') ?? null;
  return shares.map((share) => {
    const isGiven = share.collaborationId === actor.collaborationId;
    const own = surveys.find(({ id, shareId }) =>
      isGiven ? id === share.surveyId : shareId === share.id,
    );
    const state = stateOf(share);
    const isLead = own?.leadId === actor.personId;
    return {
      id: share.id,
      direction: isGiven ? 'given' : 'received',
      other: isGiven ? (nameOf.get(share.receiverId) ?? '') : share.ownerName,
      survey: { name: own?.name ?? share.surveyName, slug: own?.slug ?? null },
      scope: share.scope,
      note: share.note,
      attribution: share.attribution,
      state,
      // What a source holds is the receiver's to know while it is offered, and the owner's always.
      holds: isGiven || state === 'offered' ? (sources.get(share.id) ?? null) : null,
      offeredBy: personName(share.offeredBy),
      offeredAt: share.offeredAt.toISOString(),
      expiresAt: share.expiresAt.toISOString(),
      decidedBy: personName(share.decidedBy),
      decidedAt: share.decidedAt?.toISOString() ?? null,
      decidedWhy: share.decidedWhy,
      version: share.sourceVersion,
      copiedAt: share.copiedAt?.toISOString() ?? null,
      withdrawnFrom: share.withdrawnFrom?.toISOString() ?? null,
      withdrawnWhy: share.withdrawnWhy,
      can: {
        accept: !isGiven && state === 'offered' && may(actor, 'accept-survey'),
        refresh: !isGiven && state === 'accepted' && may(actor, 'accept-survey'),
        withdraw:
          isGiven &&
          (state === 'offered' || state === 'accepted' || state === 'ending') &&
          may(actor, 'offer-survey', { isLead }),
      },
    };
  });
}

export async function describeShare(actor: Actor, id: string): Promise<ShareView> {
  const share = await ShareRow.findByPk(id, { rejectOnEmpty: true });
  return describeShares(actor, await readBehind(actor.collaborationId, [share]))[0];
}

/** An offer from or to this collaboration, or the same "no such offer" for absent and foreign. */
export async function findShare(
  actor: Actor,
  id: string,
  side: 'given' | 'received',
): Promise<ShareRow> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const mine = side === 'given' ? { collaborationId } : { receiverId: collaborationId };
  const row = idSchema.safeParse(id).success
    ? await ShareRow.findOne({ where: { id, ...mine } })
    : null;
  if (!row) throw new NotFound('offer');
  return row;
}

async function readShares(collaborationId: string) {
  const [[{ code }], rows] = await Promise.all([
    select<{ code: string }>('select sharing_code as code from collaboration where id = $1', [
      collaborationId,
    ]),
    ShareRow.findAll({
      where: { [Op.or]: [{ collaborationId }, { receiverId: collaborationId }] },
      order: [
        ['offeredAt', 'DESC'],
        ['id', 'ASC'],
      ],
    }),
  ]);
  return { code, behind: await readBehind(collaborationId, rows) };
}

/** The code by which others find this collaboration, and every offer from and to it, newest first. */
export async function listShares(actor: Actor): Promise<Shares> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const { code, behind } = await together(`shares ${collaborationId}`, () =>
    readShares(collaborationId),
  );
  return { code, shares: describeShares(actor, behind) };
}
