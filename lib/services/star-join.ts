import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { Conflict } from '@/lib/errors';
import { foldName } from '@/lib/formats';
import { enqueueMaps } from '@/lib/queue/enqueue';
import { ContrastCurveRow, type StarMatchRow, StarRow, SurveyRow, TargetRow } from '@/models';
import { loadAdopted } from '@/models/adopted-values';

const LONGEST_NAME = 100;

/** Has the maps of these targets made anew, where they rest on a curve. */
export async function refreshMaps(
  actor: Actor,
  targets: Pick<TargetRow, 'id' | 'surveyId'>[],
  transaction: Transaction,
): Promise<void> {
  const curves = await ContrastCurveRow.findAll({
    attributes: ['targetId'],
    where: { targetId: targets.map(({ id }) => id), replacedAt: null },
    transaction,
  });
  const concerned = new Set(curves.map(({ targetId }) => targetId));
  const bySurvey = new Map<string, string[]>();
  for (const { id, surveyId } of targets) {
    if (concerned.has(id)) bySurvey.set(surveyId, [...(bySurvey.get(surveyId) ?? []), id]);
  }
  // In one order, and jobs before targets as the worker has it, so that nobody waits in a circle.
  for (const surveyId of [...bySurvey.keys()].sort()) {
    await enqueueMaps(transaction, {
      collaborationId: actor.collaborationId,
      surveyId,
      requestedBy: actor.personId,
      targetIds: bySurvey.get(surveyId),
    });
  }
  await TargetRow.update(
    { mapState: 'waiting', mapFault: null },
    { where: { id: [...concerned] }, transaction },
  );
}

/**
 * Locks every star of a collaboration until the transaction ends.
 *
 * @returns the root of a star, also after further ones were joined through the rows given out here
 */
export async function lockStars(
  collaborationId: string,
  transaction: Transaction,
): Promise<(id: string) => StarRow> {
  const stars = await StarRow.findAll({
    where: { collaborationId },
    order: [['id', 'ASC']],
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const byId = new Map(stars.map((star) => [star.id, star]));
  return function rootOf(id: string): StarRow {
    const star = byId.get(id);
    if (!star) throw new Error(`star ${id} of a pair is not there`);
    return star.mergedInto === null ? star : rootOf(star.mergedInto);
  };
}

const targetsOf = (starIds: string[], transaction: Transaction) =>
  TargetRow.findAll({
    attributes: ['id', 'starId', 'surveyId', 'name'],
    where: { starId: starIds },
    order: [['id', 'ASC']],
    transaction,
  });

async function refuseSameSurvey(targets: TargetRow[], transaction: Transaction): Promise<void> {
  const seen = new Map<string, TargetRow>();
  for (const target of targets) {
    const other = seen.get(target.surveyId);
    if (other && other.starId !== target.starId) {
      const survey = await SurveyRow.findByPk(target.surveyId, { transaction });
      throw new Conflict(
        `${survey?.name} lists both ${other.name} and ${target.name}, and a survey holds a star once. ` +
          'Leave one of the two out of the survey with a reason, or keep them apart',
      );
    }
    seen.set(target.surveyId, target);
  }
}

/** Adopted values may hold for other targets now: their maps are then made anew. */
export async function refreshIfAdopted(
  actor: Actor,
  starIds: string[],
  targets: TargetRow[],
  transaction: Transaction,
): Promise<void> {
  const { age, distance } = await loadAdopted(actor.collaborationId, transaction);
  if (starIds.some((id) => age.has(id) || distance.has(id))) {
    await refreshMaps(actor, targets, transaction);
  }
}

export interface Joined {
  /** What is needed to part them again. */
  absorbedStarId: string;
  movedTargetIds: string[];
  survivorId: string;
  /** Entries of both. */
  targets: TargetRow[];
}

/**
 * Makes two stars one. The one with more entries stays, of equals the older; the other keeps its
 * row without targets.
 *
 * @throws Conflict where one survey lists both
 */
export async function joinStars(pair: StarRow[], transaction: Transaction): Promise<Joined> {
  const targets = await targetsOf(
    pair.map(({ id }) => id),
    transaction,
  );
  await refuseSameSurvey(targets, transaction);
  const entriesOf = (star: StarRow) => targets.filter(({ starId }) => starId === star.id).length;
  const [survivor, absorbed] = [...pair].sort(
    (a, b) =>
      entriesOf(b) - entriesOf(a) ||
      a.createdAt.getTime() - b.createdAt.getTime() ||
      (a.id < b.id ? -1 : 1),
  );
  const movedTargetIds = targets.filter(({ starId }) => starId === absorbed.id).map(({ id }) => id);
  await TargetRow.update(
    { starId: survivor.id },
    { where: { id: movedTargetIds, starId: absorbed.id }, transaction },
  );
  await absorbed.update({ mergedInto: survivor.id }, { transaction });
  return { absorbedStarId: absorbed.id, movedTargetIds, survivorId: survivor.id, targets };
}

/** Gives the absorbed star of a confirmed pair back what it brought. */
export async function partStars(
  actor: Actor,
  match: StarMatchRow,
  transaction: Transaction,
): Promise<void> {
  const rootOf = await lockStars(match.collaborationId, transaction);
  const root = rootOf(match.firstStarId);
  const absorbed = await StarRow.findByPk(match.absorbedStarId ?? '', {
    transaction,
    rejectOnEmpty: true,
  });
  const before = await targetsOf([root.id], transaction);
  await refreshIfAdopted(actor, [root.id], before, transaction);
  await TargetRow.update(
    { starId: absorbed.id },
    { where: { id: match.movedTargetIds, starId: root.id }, transaction },
  );
  await absorbed.update({ mergedInto: null }, { transaction });
  const after = await targetsOf([root.id, absorbed.id], transaction);
  await refreshIfAdopted(actor, [root.id, absorbed.id], after, transaction);
}

/** A star of its own for one target, under a name that is still free. */
export async function createStarFor(target: TargetRow, transaction: Transaction): Promise<StarRow> {
  const { collaborationId, gaiaDr3Id } = target;
  const survey = await SurveyRow.findByPk(target.surveyId, { transaction, rejectOnEmpty: true });
  for (let attempt = 0; ; attempt++) {
    const tail = attempt === 0 ? '' : ` (${survey.name}${attempt > 1 ? ` ${attempt}` : ''})`;
    const name = target.name.slice(0, LONGEST_NAME - tail.length) + tail;
    const foldedName = foldName(name);
    const taken = await StarRow.count({ where: { collaborationId, foldedName }, transaction });
    if (taken > 0) continue;
    const isHeld =
      gaiaDr3Id !== null &&
      (await StarRow.count({ where: { collaborationId, gaiaDr3Id }, transaction })) > 0;
    return StarRow.create(
      { collaborationId, name, foldedName, gaiaDr3Id: isHeld ? null : gaiaDr3Id },
      { transaction },
    );
  }
}
