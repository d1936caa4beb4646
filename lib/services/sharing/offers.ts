import { type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import type { OfferSurvey, ShareView, WithdrawShare } from '@/lib/schemas/sharing';
import { CollaborationRow, database, inTransaction, ShareRow, SurveyRow } from '@/models';
import { recordAudit } from '../audit';
import { findSurvey, isLead } from '../surveys';
import { collectContent } from './content';
import { keepCopy } from './copied-survey';
import { describeShare, findShare, stateOf } from './shares';

const DAY_MS = 86_400_000;
const SCOPE_WORDS = { whole: 'whole', maps: 'its maps only' } as const;

/** Both collaborations read in their logs what happened between them. */
async function recordBoth(
  actor: Actor,
  action: string,
  share: ShareRow,
  summary: string,
  transaction: Transaction,
): Promise<void> {
  const item = { kind: 'share', id: share.id };
  await recordAudit(actor, action, item, summary, transaction);
  const isOwner = share.collaborationId === actor.collaborationId;
  const other = isOwner ? share.receiverId : share.collaborationId;
  if (other === null) return;
  const from = await CollaborationRow.findByPk(actor.collaborationId, {
    transaction,
    rejectOnEmpty: true,
  });
  const there = { personId: actor.personId, via: actor.via, collaborationId: other };
  await recordAudit(there, action, item, `of ${from.name} ${summary}`, transaction);
}

/** Refuses what has passed or was decided already. */
function demandState(share: ShareRow, ...wanted: ReturnType<typeof stateOf>[]): void {
  const state = stateOf(share);
  if (wanted.includes(state)) return;
  const words = {
    offered: 'is open and was not accepted yet',
    expired: 'has expired; ask for it again',
    refused: 'was refused already',
    'taken-back': 'was taken back',
    accepted: 'was accepted already',
    ending: 'is being withdrawn',
    withdrawn: 'was withdrawn',
  }[state];
  throw new Conflict(`The offer of ${share.surveyName} ${words}`);
}

const lock = (share: ShareRow, transaction: Transaction) =>
  share.reload({ transaction, lock: transaction.LOCK.UPDATE });

async function receiverOf(actor: Actor, code: string): Promise<{ id: string; name: string }> {
  const receiver = await CollaborationRow.findOne({
    where: database().where(database().col('sharing_code'), code),
  });
  if (!receiver) throw new NotFound('collaboration with this sharing code');
  if (receiver.id === actor.collaborationId) {
    throw new Conflict('This is the sharing code of this collaboration itself');
  }
  return receiver;
}

/** Offers a survey, whole or its maps only, to the collaboration whose sharing code is given. */
export async function offerSurvey(
  actor: Actor,
  slug: string,
  given: OfferSurvey,
): Promise<ShareView> {
  const survey = await findSurvey(actor, slug);
  demand(actor, 'offer-survey', { isLead: isLead(actor, survey) });
  if (survey.shareId !== null) {
    throw new Conflict(
      `${survey.name} is shared with this collaboration: only its owner offers it`,
    );
  }
  const receiver = await receiverOf(actor, given.code);
  const { collaborationId, personId } = actor;
  try {
    const id = await inTransaction(async (transaction) => {
      const owner = await CollaborationRow.findByPk(collaborationId, {
        transaction,
        rejectOnEmpty: true,
      });
      const standing = { surveyId: survey.id, receiverId: receiver.id, state: 'offered' as const };
      for (const old of await ShareRow.findAll({ where: standing, transaction })) {
        if (stateOf(old) === 'expired') await old.update({ state: 'expired' }, { transaction });
      }
      const share = await ShareRow.create(
        {
          ...standing,
          collaborationId,
          scope: given.scope,
          ownerName: owner.name,
          surveyName: survey.name,
          note: given.note,
          attribution: given.attribution,
          offeredBy: personId,
          expiresAt: new Date(Date.now() + given.expiresInDays * DAY_MS),
        },
        { transaction },
      );
      const summary = `offered ${survey.name}, ${SCOPE_WORDS[given.scope]}, to ${receiver.name}`;
      await recordBoth(actor, 'offer-survey', share, summary, transaction);
      return share.id;
    });
    return await describeShare(actor, id);
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Conflict(
      `${survey.name} is offered to ${receiver.name}, or shared with them, already`,
    );
  }
}

async function copy(actor: Actor, share: ShareRow, transaction: Transaction): Promise<SurveyRow> {
  const content = await collectContent(share, transaction);
  if (!content) throw new Conflict(`${share.surveyName} is not there any more`);
  return keepCopy(actor, share, content, transaction);
}

/** Takes an offer: everything that it holds is copied in one transaction, or nothing. */
export async function acceptShare(actor: Actor, id: string): Promise<ShareView> {
  const share = await findShare(actor, id, 'received');
  demand(actor, 'accept-survey');
  await inTransaction(async (transaction) => {
    await lock(share, transaction);
    demandState(share, 'offered');
    const survey = await copy(actor, share, transaction);
    await share.update(
      { state: 'accepted', decidedBy: actor.personId, decidedAt: new Date() },
      { transaction },
    );
    const summary = `accepted ${survey.name}, ${SCOPE_WORDS[share.scope]}, shared by ${share.ownerName}`;
    await recordBoth(actor, 'accept-survey', share, summary, transaction);
  });
  return describeShare(actor, id);
}

export async function refuseShare(actor: Actor, id: string, why: string): Promise<ShareView> {
  const share = await findShare(actor, id, 'received');
  demand(actor, 'accept-survey');
  await inTransaction(async (transaction) => {
    await lock(share, transaction);
    demandState(share, 'offered');
    await share.update(
      {
        state: 'refused',
        decidedBy: actor.personId,
        decidedAt: new Date(),
        decidedWhy: why,
      },
      { transaction },
    );
    const summary = `refused ${share.surveyName}, offered by ${share.ownerName}: ${why}`;
    await recordBoth(actor, 'accept-survey', share, summary, transaction);
  });
  return describeShare(actor, id);
}

/** Brings the copy to the owner's state of now. */
export async function refreshShare(actor: Actor, id: string): Promise<ShareView> {
  const share = await findShare(actor, id, 'received');
  demand(actor, 'accept-survey');
  await inTransaction(async (transaction) => {
    await lock(share, transaction);
    demandState(share, 'accepted');
    const survey = await copy(actor, share, transaction);
    const version = share.sourceVersion?.slice(0, 8);
    const summary = `brought ${survey.name} to version ${version} of ${share.ownerName}`;
    await recordBoth(actor, 'accept-survey', share, summary, transaction);
  });
  return describeShare(actor, id);
}

/** The start of a day that is given, else this moment. */
function startOf(from: string | undefined): Date {
  const now = new Date();
  if (from === undefined) return now;
  const start = new Date(`${from}T00:00:00Z`);
  if (start <= now) {
    throw new Conflict('A withdrawal begins on a later day, or at once if no day is given');
  }
  return start;
}

/**
 * Takes an offer or a shared survey back. From then on nothing new may use the copy; runs that were
 * made keep it and are marked.
 */
export async function withdrawShare(
  actor: Actor,
  id: string,
  { why, from }: WithdrawShare,
): Promise<ShareView> {
  const share = await findShare(actor, id, 'given');
  const source = share.surveyId === null ? null : await SurveyRow.findByPk(share.surveyId);
  const isLeading = source !== null && isLead(actor, source);
  demand(actor, 'offer-survey', { isLead: isLeading });
  await inTransaction(async (transaction) => {
    await lock(share, transaction);
    demandState(share, 'offered', 'accepted', 'ending');
    const isOffer = share.copiedAt === null;
    const withdrawnFrom = isOffer ? new Date() : startOf(from);
    const now = new Date();
    await share.update(
      {
        state: 'withdrawn',
        withdrawnBy: actor.personId,
        withdrawnAt: now,
        withdrawnFrom,
        withdrawnWhy: why,
      },
      { transaction },
    );
    // From that moment the copy stands among the archived surveys.
    await SurveyRow.update(
      { archivedAt: withdrawnFrom },
      { where: { shareId: share.id }, transaction },
    );
    const day = withdrawnFrom.toISOString().slice(0, 10);
    const when = isOffer ? 'took back the offer of' : 'withdrew';
    const tail = withdrawnFrom > now ? ` from ${day}` : '';
    const summary = `${when} ${share.surveyName}${tail}: ${why}`;
    await recordBoth(actor, 'offer-survey', share, summary, transaction);
  });
  return describeShare(actor, id);
}
