import type { Transaction } from 'sequelize';
import { foldName } from '@/lib/formats';
import { select } from '@/lib/queue/statement';
import {
  CompanionObservationRow,
  CompanionRow,
  CompanionVerdictRow,
  ContrastCurveRow,
  type ShareRow,
  StarRow,
  type SurveyRow,
  TargetRow,
} from '@/models';
import { statedOf } from '../candidates/describe';
import { type FoundStar, KnownStars, noteJoined } from '../intake/known-stars';
import { proposeMatches } from '../star-sky';
import type { SharedCompanion, SharedContent, SharedTarget } from './content';
import { copiedDigest } from './copied-maps';

const GONE = 'no longer in the survey that is shared';
const LONGEST_NAME = 100;

/** The star of a new target; one that this survey holds already is another star of its own. */
async function starOf(
  target: SharedTarget,
  survey: SurveyRow,
  known: KnownStars,
  found: FoundStar | undefined,
  transaction: Transaction,
) {
  if (found) return found;
  const { collaborationId } = survey;
  const { gaiaDr3Id } = target;
  const tail = known.find(target) ? ` (${survey.name})` : '';
  const name = target.name.slice(0, LONGEST_NAME - tail.length) + tail;
  const isNumberFree = gaiaDr3Id !== null && !known.ofGaia(gaiaDr3Id);
  const star = await StarRow.create(
    {
      collaborationId,
      name,
      foldedName: foldName(name),
      gaiaDr3Id: isNumberFree ? gaiaDr3Id : null,
    },
    { transaction },
  );
  return { star, evidence: null, through: null };
}

async function keepCurves(
  target: TargetRow,
  curves: SharedTarget['curves'],
  transaction: Transaction,
): Promise<void> {
  const where = { targetId: target.id, replacedAt: null };
  const there = await ContrastCurveRow.findAll({ where, transaction });
  const wanted = new Set(curves.map(({ digest }) => digest));
  const held = new Set(there.map(({ digest }) => digest));
  const gone = there.filter(({ digest }) => !wanted.has(digest)).map(({ id }) => id);
  await ContrastCurveRow.update({ replacedAt: new Date() }, { where: { id: gone }, transaction });
  const { collaborationId, id: targetId } = target;
  await ContrastCurveRow.bulkCreate(
    curves
      .filter(({ digest }) => !held.has(digest))
      .map((curve) => ({ ...curve, collaborationId, targetId })),
    { transaction },
  );
}

async function keepVerdict(
  row: CompanionRow,
  owner: string,
  transaction: Transaction,
): Promise<void> {
  const where = { companionId: row.id };
  const order = [['number', 'DESC'] as [string, string]];
  const last = await CompanionVerdictRow.findOne({ where, order, transaction });
  if (last && JSON.stringify(statedOf(last)) === JSON.stringify(statedOf(row))) return;
  const { status, probability, massMjup, massErrorLowerMjup, massErrorUpperMjup } = row;
  const { semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu } = row;
  await CompanionVerdictRow.create(
    {
      ...where,
      collaborationId: row.collaborationId,
      number: (last?.number ?? 0) + 1,
      ...{ status, probability, massMjup, massErrorLowerMjup, massErrorUpperMjup },
      ...{ semiMajorAxisAu, semiMajorAxisErrorLowerAu, semiMajorAxisErrorUpperAu },
      reason: `As ${owner} decided, who shares the survey`,
    },
    { transaction },
  );
}

async function keepCompanions(
  target: TargetRow,
  companions: SharedCompanion[],
  owner: string,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, id: targetId } = target;
  const there = await CompanionRow.findAll({ where: { targetId }, transaction });
  const known = new Map(there.map((row) => [row.foldedName, row]));
  for (const { observations, ...fields } of companions) {
    const row = known.get(fields.foldedName);
    known.delete(fields.foldedName);
    const kept = row
      ? await row.update(fields, { transaction })
      : await CompanionRow.create({ ...fields, collaborationId, targetId }, { transaction });
    await keepVerdict(kept, owner, transaction);
    await CompanionObservationRow.destroy({ where: { companionId: kept.id }, transaction });
    await CompanionObservationRow.bulkCreate(
      observations.map((one) => ({ ...one, collaborationId, companionId: kept.id })),
      { transaction },
    );
  }
  await CompanionRow.destroy({
    where: { id: [...known.values()].map(({ id }) => id) },
    transaction,
  });
}

/**
 * Writes the targets of a shared survey into its copy: new ones come, changed ones change, and one
 * that the owner lists no longer is left out with a reason, since earlier runs may count it.
 */
export async function keepTargets(
  share: ShareRow,
  survey: SurveyRow,
  content: SharedContent,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, id: surveyId } = survey;
  const there = await TargetRow.findAll({ where: { surveyId }, transaction });
  const known = new Map(there.map((row) => [row.foldedName, row]));
  const stars = await KnownStars.load(collaborationId);
  const listed = new Set(content.targets.map(({ foldedName }) => foldedName));
  const taken = new Set(
    there.filter(({ foldedName }) => listed.has(foldedName)).map(({ starId }) => starId),
  );
  for (const { ages, curves, map, companions, ...fields } of content.targets) {
    const shared = { ages, curves, map, companions, ...fields };
    const other = stars.find(shared);
    const found = other && !taken.has(other.star.id) ? other : undefined;
    // The same star under another name is the same target, renamed.
    const row =
      known.get(fields.foldedName) ?? there.find(({ starId }) => starId === found?.star.id);
    if (row) known.delete(row.foldedName);
    const state = { ...fields, ...ages, mapId: null, mapState: 'none' as const, mapFault: null };
    let target = row;
    if (target) await target.update(state, { transaction });
    else {
      const of = await starOf(shared, survey, stars, found, transaction);
      const starEvidence = of.evidence;
      const place = { collaborationId, surveyId, starId: of.star.id, starEvidence };
      target = await TargetRow.create({ ...state, ...place }, { transaction });
      if (of.through) await noteJoined(target.id, of.through, transaction);
    }
    taken.add(target.starId);
    await keepCurves(target, curves, transaction);
    await keepCompanions(target, companions, share.ownerName, transaction);
  }
  await TargetRow.update(
    { leftOutReason: GONE },
    { where: { id: [...known.values()].map(({ id }) => id) }, transaction },
  );
  await linkMaps(share, survey, content, transaction);
  await proposeMatches(collaborationId, transaction);
}

async function linkMaps(
  { scope }: ShareRow,
  { collaborationId, id: surveyId }: SurveyRow,
  { targets }: SharedContent,
  transaction: Transaction,
): Promise<void> {
  const links = targets.flatMap(({ foldedName, map }) =>
    map ? [{ foldedName, digest: copiedDigest(map, scope) }] : [],
  );
  await select(
    `update target t set map_id = m.id, map_state = 'ready'
     from unnest($3::text[], $4::text[]) as wanted(folded_name, digest)
     join completeness_map m on m.collaboration_id = $1 and m.digest = wanted.digest
     where t.survey_id = $2 and t.folded_name = wanted.folded_name returning t.id`,
    [
      collaborationId,
      surveyId,
      links.map(({ foldedName }) => foldedName),
      links.map(({ digest }) => digest),
    ],
    transaction,
  );
}
