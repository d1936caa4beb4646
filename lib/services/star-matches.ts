import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import type { MatchState } from '@/lib/schemas/stars';
import { inTransaction, StarMatchRow, StarRow, TargetRow } from '@/models';
import { recordAudit } from './audit';
import { createStarFor, joinStars, lockStars, partStars, refreshIfAdopted } from './star-join';
import { pairKey, proposeMatches, rootsOf } from './star-sky';

const isOpen = (state: MatchState) => state === 'proposed' || state === 'undone';

/** A pair of this collaboration with its row locked; "no such pair" for absent and foreign. */
async function lockMatch(
  actor: Actor,
  id: string,
  transaction: Transaction,
): Promise<StarMatchRow> {
  const match = idSchema.safeParse(id).success
    ? await StarMatchRow.findOne({
        where: { id, collaborationId: actor.collaborationId },
        lock: transaction.LOCK.UPDATE,
        transaction,
      })
    : null;
  if (!match) throw new NotFound('pair of stars');
  return match;
}

async function decide(
  actor: Actor,
  match: StarMatchRow,
  fields: Partial<StarMatchRow['dataValues']> & { state: MatchState },
  why: string,
  transaction: Transaction,
): Promise<void> {
  await match.update(
    { ...fields, decidedBy: actor.personId, decidedAt: new Date(), why },
    { transaction },
  );
}

async function record(
  actor: Actor,
  match: StarMatchRow,
  words: string,
  transaction: Transaction,
): Promise<void> {
  const names = await StarRow.findAll({
    attributes: ['name'],
    where: { id: [match.firstStarId, match.secondStarId] },
    order: [['name', 'ASC']],
    transaction,
  });
  const pair = names.map(({ name }) => name).join(' and ');
  const summary = `${words.replace('{pair}', pair)}: ${match.why}`;
  await recordAudit(actor, 'combine', { kind: 'star-match', id: match.id }, summary, transaction);
}

/** Looks again for pairs that may be one star. */
export async function proposePairs(actor: Actor): Promise<{ proposed: number }> {
  demand(actor, 'combine');
  const { collaborationId } = actor;
  const proposed = await inTransaction((transaction) =>
    proposeMatches(collaborationId, transaction),
  );
  return { proposed };
}

/**
 * Makes one star of each pair that is not yet; the maps that follow from adopted values are asked
 * for once, at the end.
 *
 * @returns the pairs that were joined here
 */
async function joinPairs(
  actor: Actor,
  matches: StarMatchRow[],
  why: string,
  transaction: Transaction,
): Promise<StarMatchRow[]> {
  const rootOf = await lockStars(actor.collaborationId, transaction);
  const survivors = new Set<string>();
  const moved = new Map<string, TargetRow>();
  const joined: StarMatchRow[] = [];
  for (const match of matches) {
    const pair = [rootOf(match.firstStarId), rootOf(match.secondStarId)];
    if (match.state === 'confirmed' || pair[0].id === pair[1].id) continue;
    const { absorbedStarId, movedTargetIds, survivorId, targets } = await joinStars(
      pair,
      transaction,
    );
    const fields = { state: 'confirmed' as const, absorbedStarId, movedTargetIds };
    await decide(actor, match, fields, why, transaction);
    await record(actor, match, 'took {pair} for one star', transaction);
    survivors.add(survivorId);
    for (const target of targets) moved.set(target.id, target);
    joined.push(match);
  }
  await refreshIfAdopted(actor, [...survivors], [...moved.values()], transaction);
  return joined;
}

/** The two stars of a pair become one. */
export async function confirmMatch(actor: Actor, id: string, why: string): Promise<void> {
  demand(actor, 'combine');
  await inTransaction(async (transaction) => {
    const match = await lockMatch(actor, id, transaction);
    if (match.state === 'confirmed') return;
    const joined = await joinPairs(actor, [match], why, transaction);
    if (joined.length === 0) {
      throw new Conflict('These two are one star already, by another pair');
    }
  });
}

/**
 * The stars of each pair become one: of all pairs or, where one cannot be joined, of none. Pairs
 * that another one of them makes one are left as they are.
 */
export async function confirmMatches(actor: Actor, ids: string[], why: string): Promise<void> {
  demand(actor, 'combine');
  await inTransaction(async (transaction) => {
    // In one order, so that two people who confirm the same pairs do not wait in a circle.
    const matches: StarMatchRow[] = [];
    for (const id of [...new Set(ids)].sort())
      matches.push(await lockMatch(actor, id, transaction));
    await joinPairs(actor, matches, why, transaction);
  });
}

/** The two stars of a pair stay two, and the pair is not proposed again. */
export async function refuseMatch(actor: Actor, id: string, why: string): Promise<void> {
  demand(actor, 'combine');
  await inTransaction(async (transaction) => {
    const match = await lockMatch(actor, id, transaction);
    if (match.state === 'refused') return;
    if (match.state === 'confirmed') {
      throw new Conflict('These two were taken for one star; undo that first');
    }
    for (const same of await openWithSameRoots(match, transaction)) {
      await decide(actor, same, { state: 'refused' }, why, transaction);
    }
    await match.reload({ transaction });
    await record(actor, match, 'kept {pair} apart', transaction);
  });
}

/** Open pairs that came to mean the same two stars, this one among them. */
async function openWithSameRoots(
  match: StarMatchRow,
  transaction: Transaction,
): Promise<StarMatchRow[]> {
  const { collaborationId } = match;
  const stars = await StarRow.findAll({
    attributes: ['id', 'mergedInto'],
    where: { collaborationId },
    transaction,
  });
  const roots = rootsOf(stars);
  const keyOf = ({ firstStarId, secondStarId }: StarMatchRow) =>
    pairKey(roots.get(firstStarId) ?? firstStarId, roots.get(secondStarId) ?? secondStarId);
  const open = await StarMatchRow.findAll({
    where: { collaborationId, state: ['proposed', 'undone'] },
    transaction,
  });
  return open.filter((other) => keyOf(other) === keyOf(match));
}

/** A decision is taken back: the pair is as it was, and waits for another one. */
export async function undoMatch(actor: Actor, id: string, why: string): Promise<void> {
  demand(actor, 'combine');
  await inTransaction(async (transaction) => {
    const match = await lockMatch(actor, id, transaction);
    if (isOpen(match.state)) throw new Conflict('Nothing was decided of this pair');
    if (match.state === 'confirmed') await partStars(actor, match, transaction);
    const fields = { state: 'undone' as const, absorbedStarId: null, movedTargetIds: [] };
    await decide(actor, match, fields, why, transaction);
    await record(actor, match, 'took the decision on {pair} back', transaction);
  });
}

/** Parts one survey's entry from a star that it was joined to by its number or a name. */
export async function splitStar(
  actor: Actor,
  starId: string,
  { targetId, why }: { targetId: string; why: string },
): Promise<void> {
  demand(actor, 'combine');
  const { collaborationId } = actor;
  await inTransaction(async (transaction) => {
    const star = idSchema.safeParse(starId).success
      ? await StarRow.findOne({
          where: { id: starId, collaborationId, mergedInto: null },
          lock: transaction.LOCK.UPDATE,
          transaction,
        })
      : null;
    if (!star) throw new NotFound('star');
    const entries = await TargetRow.findAll({ where: { starId: star.id }, transaction });
    const target = entries.find(({ id }) => id === targetId);
    if (!target) throw new NotFound('entry of this star');
    if (entries.length === 1) throw new Conflict(`${star.name} has this one entry only`);
    const joined = await StarMatchRow.findAll({
      where: { collaborationId, state: 'confirmed' },
      transaction,
    });
    if (joined.some(({ movedTargetIds }) => movedTargetIds.includes(target.id))) {
      throw new Conflict('This entry came with a star that a person confirmed; undo that decision');
    }
    const own = await createStarFor(target, transaction);
    const evidence = target.starEvidence ?? { by: 'name' as const, found: target.name };
    await target.update({ starId: own.id, starEvidence: null }, { transaction });
    await refreshIfAdopted(actor, [star.id], [target], transaction);
    const [firstStarId, secondStarId] = [star.id, own.id].sort();
    const match = await StarMatchRow.create(
      {
        collaborationId,
        firstStarId,
        secondStarId,
        state: 'refused',
        evidence,
        decidedBy: actor.personId,
        decidedAt: new Date(),
        why,
      },
      { transaction },
    );
    await record(actor, match, 'parted {pair}', transaction);
  });
}
