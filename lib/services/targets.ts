import { Op, QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { idSchema } from '@/lib/schemas/common';
import type { CompanionView, MarkTarget, TargetList, TargetView } from '@/lib/schemas/surveys';
import {
  CompanionRow,
  ContrastCurveRow,
  database,
  inTransaction,
  SurveyRow,
  TargetRow,
} from '@/models';
import { wasChosenForCompanion } from '@/models/sample-selection';
import { recordAudit } from './audit';
import { behindRow, type PageAsked } from './behind-row';
import { isArchived } from './sharing/archived';
import { refuseShared } from './sharing/shared-surveys';
import { currentYardstick, summariseMaps } from './survey-depth';
import { findSurvey, isLead } from './surveys';
import { together } from './together';

type AlsoIn = Map<string, TargetView['alsoIn']>;

async function findSharing(collaborationId: string, surveyId: string): Promise<AlsoIn> {
  const rows = await database().query<{
    star_id: string;
    slug: string;
    name: string;
    position: number;
  }>(
    `select t.star_id, s.slug, s.name, s.position from target t join survey s on s.id = t.survey_id
     where t.collaboration_id = $1 and t.survey_id <> $2
       and t.star_id in (select star_id from target where survey_id = $2)
     order by s.position`,
    { bind: [collaborationId, surveyId], type: QueryTypes.SELECT },
  );
  const sharing: AlsoIn = new Map();
  for (const { star_id, ...survey } of rows) {
    sharing.set(star_id, [...(sharing.get(star_id) ?? []), survey]);
  }
  return sharing;
}

/** What a reader should know before trusting the row; each is one short fact. */
function checksOf(target: TargetRow, curves: ContrastCurveRow[]): string[] {
  const checks: string[] = [];
  if (target.ageMyr !== null && target.ageLowerMyr === null && target.ageMinMyr === null) {
    checks.push('no age error');
  }
  if (target.ageMyr === null && target.ageMinMyr === null && curves.length > 0)
    checks.push('no age');
  if (target.distancePc === null && target.parallaxMas === null && curves.length > 0) {
    checks.push('no distance');
  }
  const first = Math.min(...curves.map((curve) => curve.separationArcsec[0]));
  if (curves.length > 0 && first > 0.3) checks.push(`starts at ${first.toFixed(2)}″`);
  if (target.mapFault) checks.push(target.mapFault);
  return checks;
}

function describeTarget(
  target: TargetRow,
  curves: ContrastCurveRow[],
  alsoIn: TargetView['alsoIn'],
  probability: number | null,
): TargetView {
  const distancePc = target.distancePc ?? (target.parallaxMas ? 1000 / target.parallaxMas : null);
  const parallaxShare =
    target.parallaxMas && target.parallaxErrorMas
      ? target.parallaxErrorMas / target.parallaxMas
      : null;
  return {
    id: target.id,
    starId: target.starId,
    name: target.name,
    spectralType: target.spectralType,
    distancePc,
    distanceErrorPc:
      target.distanceErrorPc ?? (distancePc && parallaxShare ? distancePc * parallaxShare : null),
    ageMyr: target.ageMyr,
    ageLowerMyr: target.ageLowerMyr,
    ageUpperMyr: target.ageUpperMyr,
    hostMassMsun: target.hostMassMsun,
    movingGroup: target.movingGroup,
    magnitudes: target.magnitudes,
    curves: curves.map((curve) => ({
      id: curve.id,
      band: curve.band,
      epoch: curve.epoch,
      nSigma: curve.nSigma,
      separationArcsec: curve.separationArcsec,
      contrastMag: curve.contrastMag,
    })),
    mapId: target.mapId,
    mapState: target.mapState,
    mapFault: target.mapFault,
    probability,
    alsoIn,
    leftOutReason: target.leftOutReason,
    selectedForCompanion: wasChosenForCompanion(target),
    checks: checksOf(target, curves),
  };
}

const isTakenBack = (survey: SurveyRow) => survey.shareId !== null && isArchived(survey);

async function describeTargets(
  survey: SurveyRow,
  targets: TargetRow[],
): Promise<Pick<TargetList, 'targets' | 'yardstick'>> {
  const mass = survey.mapSettings.massMjup;
  const axis = survey.mapSettings.semiMajorAxisAu;
  const grid = {
    massMjup: logSpacedAxis(mass.min, mass.max, mass.count),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, axis.count),
  };
  const [sharing, yardstick, curves] = await Promise.all([
    findSharing(survey.collaborationId, survey.id),
    currentYardstick(survey.collaborationId),
    ContrastCurveRow.findAll({
      // What its owner has taken back is shown no more; the maps of earlier runs stay with them.
      where: {
        targetId: isTakenBack(survey) ? [] : targets.map((target) => target.id),
        replacedAt: null,
      },
      order: [
        ['epoch', 'ASC'],
        ['band', 'ASC'],
      ],
    }),
  ]);
  const mapIds = targets.flatMap((target) => (target.mapId ? [target.mapId] : []));
  const summaries = await summariseMaps(survey.collaborationId, mapIds, yardstick, grid);
  const curvesOf = new Map<string, ContrastCurveRow[]>();
  for (const curve of curves) {
    curvesOf.set(curve.targetId, [...(curvesOf.get(curve.targetId) ?? []), curve]);
  }
  return {
    targets: targets.map((target) =>
      describeTarget(
        target,
        curvesOf.get(target.id) ?? [],
        sharing.get(target.starId) ?? [],
        (target.mapId && summaries.get(target.mapId)?.probability) ?? null,
      ),
    ),
    yardstick: yardstick.view,
  };
}

const EASTWARD = {
  table: 'target',
  keys: (row: string) => [`coalesce(${row}.ra_deg, 'Infinity')`, `${row}.folded_name`, `${row}.id`],
  direction: 'up',
} as const;

/** Targets of a survey by right ascension, then name. */
export async function listTargets(
  actor: Actor,
  slug: string,
  { limit, offset, after }: PageAsked,
): Promise<TargetList> {
  const { id } = await findSurvey(actor, slug);
  const key = `targets ${id} ${limit} ${offset} ${after ?? ''}`;
  return together(key, () => readTargets(id, { limit, offset, after }));
}

async function readTargets(
  surveyId: string,
  { limit, offset, after }: PageAsked,
): Promise<TargetList> {
  const survey = await SurveyRow.findByPk(surveyId);
  if (!survey) throw new NotFound('survey');
  const { collaborationId } = survey;
  const where = { surveyId: survey.id };
  const rows = await TargetRow.findAll({
    where: {
      ...where,
      ...(after && {
        [Op.and]: await behindRow(EASTWARD, { name: 'target', collaborationId, after }),
      }),
    },
    order: [
      ['raDeg', 'ASC NULLS LAST'],
      ['foldedName', 'ASC'],
      ['id', 'ASC'],
    ],
    limit,
    offset,
  });
  const total = await TargetRow.count({ where });
  return { ...(await describeTargets(survey, rows)), total };
}

async function findTarget(
  actor: Actor,
  id: string,
): Promise<{ target: TargetRow; survey: SurveyRow }> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const target = isId
    ? await TargetRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  const survey = target && (await SurveyRow.findByPk(target.surveyId));
  if (!target || !survey) throw new NotFound('target');
  return { target, survey };
}

export async function getTarget(actor: Actor, id: string): Promise<TargetView> {
  const { target, survey } = await findTarget(actor, id);
  const { targets } = await describeTargets(survey, [target]);
  return targets[0];
}

/**
 * Leaves a target out of every later run with a reason, where null takes it back in; or marks it as
 * chosen because a companion was known.
 */
export async function markTarget(
  actor: Actor,
  id: string,
  { leftOutReason: reason, selectedForCompanion: mark }: MarkTarget,
): Promise<TargetView> {
  const { target, survey } = await findTarget(actor, id);
  demand(actor, 'change-survey', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  await inTransaction(async (transaction) => {
    const attributes = { ...target.attributes, selectedForCompanion: mark };
    await target.update(
      {
        ...(reason !== undefined && { leftOutReason: reason }),
        ...(mark !== undefined && { attributes }),
      },
      { transaction },
    );
    const words = markWords(target.name, reason, mark);
    await recordAudit(
      actor,
      'change-survey',
      { kind: 'target', id: target.id },
      words,
      transaction,
    );
  });
  return getTarget(actor, id);
}

function markWords(
  name: string,
  reason: string | null | undefined,
  mark: boolean | undefined,
): string {
  const words: string[] = [];
  if (reason !== undefined)
    words.push(reason === null ? `took ${name} back in` : `left ${name} out: ${reason}`);
  if (mark === true) words.push(`marked ${name} as chosen because a companion was known`);
  if (mark === false) words.push(`marked ${name} as not chosen for a known companion`);
  return words.join('; ');
}

/** A companion or candidate as the API lists it, beside the name of its target. */
export const companionView = (row: CompanionRow, target: string | undefined): CompanionView => ({
  id: row.id,
  target: target ?? '',
  targetId: row.targetId,
  name: row.name,
  status: row.status,
  massMjup: row.massMjup,
  massErrorLowerMjup: row.massErrorLowerMjup,
  massErrorUpperMjup: row.massErrorUpperMjup,
  semiMajorAxisAu: row.semiMajorAxisAu,
  semiMajorAxisErrorLowerAu: row.semiMajorAxisErrorLowerAu,
  semiMajorAxisErrorUpperAu: row.semiMajorAxisErrorUpperAu,
  probability: row.probability,
  reference: row.reference,
});

/** Companions and candidates of a survey's targets. */
export async function listCompanions(actor: Actor, slug: string): Promise<CompanionView[]> {
  const survey = await findSurvey(actor, slug);
  const targets = await TargetRow.findAll({
    where: { surveyId: survey.id },
    attributes: ['id', 'name'],
  });
  const names = new Map(targets.map((target) => [target.id, target.name]));
  const rows = await CompanionRow.findAll({
    where: { targetId: [...names.keys()] },
    order: [
      ['status', 'DESC'],
      ['createdAt', 'ASC'],
      ['name', 'ASC'],
    ],
  });
  return rows.map((row) => companionView(row, names.get(row.targetId)));
}
