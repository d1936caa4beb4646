import type { Transaction } from 'sequelize';
import { Op } from 'sequelize';
import type { StarInputs } from '@/lib/sensitivity';
import { applyAdopted, loadAdopted } from './adopted-values';
import { CompletenessMapRow, ContrastCurveRow, SurveyRow, TargetRow } from './index';
import { loadRecipe, type MapRecipe, mapDigest, mapInputs } from './map-recipe';
import { openCandidates } from './star-facts';
import { buildStarInputs, MissingInput } from './star-inputs';

/** A map that a target should have. */
export interface WantedMap {
  targetId: string;
  name: string;
  digest: string;
  star: StarInputs;
  inputs: ReturnType<typeof mapInputs>;
}

export interface MapPlan {
  recipe: MapRecipe;
  /** Targets with a curve, whatever their state. */
  total: number;
  /** Linked to the right map already. */
  current: number;
  /** The map is there, only the link is not. */
  reusable: WantedMap[];
  missing: WantedMap[];
  faults: { targetId: string; fault: string }[];
  /** Every map that the curves should give, whether it is there or not. */
  wanted: WantedMap[];
  targets: TargetRow[];
}

async function loadCurves(
  targets: TargetRow[],
  transaction?: Transaction,
): Promise<Map<string, ContrastCurveRow[]>> {
  const rows = await ContrastCurveRow.findAll({
    where: { targetId: targets.map((target) => target.id), replacedAt: null },
    transaction,
  });
  const curvesOf = new Map<string, ContrastCurveRow[]>();
  for (const row of rows) {
    const list = curvesOf.get(row.targetId);
    if (list) list.push(row);
    else curvesOf.set(row.targetId, [row]);
  }
  return curvesOf;
}

/** Compares the maps that a survey's targets have with those that their curves should give. */
export async function planMaps(
  job: { collaborationId: string; surveyId: string; targetIds?: string[] },
  transaction?: Transaction,
): Promise<MapPlan> {
  const { collaborationId, surveyId, targetIds } = job;
  const survey = await SurveyRow.findOne({
    where: { id: surveyId, collaborationId },
    transaction,
    rejectOnEmpty: true,
  });
  const recipe = await loadRecipe(collaborationId, survey.mapSettings, transaction);
  const targets = await TargetRow.findAll({
    where: { surveyId, ...(targetIds && { id: targetIds }) },
    include: [openCandidates()],
    order: [
      ['foldedName', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  const adopted = await loadAdopted(collaborationId, transaction);
  for (const target of targets) applyAdopted(target, adopted);
  const curvesOf = await loadCurves(targets, transaction);
  const faults: MapPlan['faults'] = [];
  const wanted: (WantedMap & { linkedMapId: string | null })[] = [];
  for (const target of targets) {
    const curves = curvesOf.get(target.id);
    if (!curves) continue;
    const ownCurves = curves.map((curve) => ({ target, curve }));
    try {
      const star = buildStarInputs(target, ownCurves);
      const inputs = mapInputs(star, ownCurves, recipe);
      const { id: targetId, name, mapId, mapState } = target;
      const linkedMapId = mapState === 'ready' ? mapId : null;
      wanted.push({ targetId, name, digest: mapDigest(inputs), star, inputs, linkedMapId });
    } catch (error) {
      if (!(error instanceof MissingInput)) throw error;
      faults.push({ targetId: target.id, fault: error.message });
    }
  }
  const stored = await CompletenessMapRow.findAll({
    attributes: ['id', 'digest'],
    where: { collaborationId, digest: { [Op.in]: wanted.map(({ digest }) => digest) } },
    transaction,
  });
  const idOf = new Map(stored.map(({ digest, id }) => [digest, id]));
  const isCurrent = ({ digest, linkedMapId }: (typeof wanted)[number]) =>
    linkedMapId !== null && idOf.get(digest) === linkedMapId;
  return {
    recipe,
    total: wanted.length + faults.length,
    current: wanted.filter(isCurrent).length,
    reusable: wanted.filter((map) => idOf.has(map.digest) && !isCurrent(map)),
    missing: wanted.filter((map) => !idOf.has(map.digest)),
    faults,
    wanted,
    targets,
  };
}
