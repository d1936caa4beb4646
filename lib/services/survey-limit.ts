import { Op, QueryTypes } from 'sequelize';
import { answerFromView, type Detection, viewOfStars } from '@/lib/inference';
import { hostScalingOf, populationBox } from '@/lib/population';
import { findEdgeOutside } from '@/lib/queue/preconditions';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { SurveyLimit } from '@/lib/schemas/surveys';
import { CompanionRow, database, type SurveyRow, TargetRow } from '@/models';
import { wasChosenForCompanion } from '@/models/sample-selection';
import { LEAD_ANALYSIS } from './lead-analysis';
import { gridOfSettings, type MapSummary, summariseMaps, type Yardstick } from './survey-depth';

interface Lead {
  number: number;
  recipe: AnalysisRecipe;
}

async function readLead(collaborationId: string): Promise<Lead | undefined> {
  const [lead] = await database().query<Lead>(
    `select number, recipe from (${LEAD_ANALYSIS}) as lead`,
    { bind: [collaborationId], type: QueryTypes.SELECT },
  );
  return lead;
}

/** A star that counts, with its map. */
type Counted = Pick<TargetRow, 'id' | 'attributes'> & { mapId: string };

async function readCounted({ id: surveyId }: SurveyRow): Promise<Counted[]> {
  const targets = await TargetRow.findAll({
    attributes: ['id', 'mapId', 'attributes'],
    where: {
      surveyId,
      mapState: 'ready',
      mapId: { [Op.not]: null },
      leftOutReason: { [Op.is]: null },
    },
    order: [['foldedName', 'ASC']],
    raw: true,
  });
  return (targets as Counted[]).filter((target) => !wasChosenForCompanion(target));
}

/** Confirmed companions of these stars; null where a run would refuse one. */
async function readDetections(counted: readonly Counted[]): Promise<Detection[] | null> {
  const starOf = new Map(counted.map(({ id }, star) => [id, star]));
  const rows = await CompanionRow.findAll({
    attributes: ['targetId', 'name', 'massMjup', 'semiMajorAxisAu'],
    where: { targetId: [...starOf.keys()], status: 'confirmed' },
    raw: true,
  });
  const detections = rows.flatMap(({ targetId, name, massMjup, semiMajorAxisAu }) =>
    massMjup === null || semiMajorAxisAu === null
      ? []
      : [{ name, massMjup, semiMajorAxisAu, star: starOf.get(targetId) as number }],
  );
  return detections.length === rows.length ? detections : null;
}

/**
 * The limit that a survey's stars give by themselves, asked as the lead analysis asks.
 *
 * @returns null where no lead analysis asks for one box of all stars, where a run of the survey alone
 *   would be refused (its ranges reach past the maps, a companion lacks mass or axis), and where the
 *   lead's open candidates count by their probability, which a run alone works out
 */
export async function limitAlone(
  row: SurveyRow,
  yardstick: Yardstick,
): Promise<SurveyLimit | null> {
  const { population, view: asked } = yardstick;
  if (asked.analysis === null || hostScalingOf(population)) return null;
  const [lead, counted] = await Promise.all([readLead(row.collaborationId), readCounted(row)]);
  if (!lead || lead.recipe.candidates || counted.length === 0) return null;
  const { likelihood, prior, background, credibleLevel: level } = lead.recipe;
  const { massMjup: mass, semiMajorAxisAu: axis } = row.mapSettings;
  const reach = {
    massMinMjup: mass.min,
    massMaxMjup: mass.max,
    semiMajorAxisMinAu: axis.min,
    semiMajorAxisMaxAu: axis.max,
  };
  if (!lead.recipe.zeroOutsideMaps && findEdgeOutside(populationBox(population), reach))
    return null;
  const mapIds = counted.map(({ mapId }) => mapId);
  const [seen, companions] = await Promise.all([
    summariseMaps(row.collaborationId, mapIds, yardstick, gridOfSettings(row.mapSettings)),
    lead.recipe.detections === 'none' ? [] : readDetections(counted),
  ]);
  if (!companions || !mapIds.every((id) => seen.has(id))) return null;
  const perStar = Float64Array.from(mapIds, (id) => (seen.get(id) as MapSummary).probability);
  try {
    const answer = answerFromView(viewOfStars(population, perStar), {
      ...{ likelihood, prior, level, detections: companions },
      ...(background !== undefined && { background }),
    });
    if (!answer.posterior.constrained) return null;
    return {
      analysis: `A-${lead.number}`,
      quantity: answer.posterior.quantity,
      level,
      limit: answer.limit,
      isSetByPrior: answer.setByPrior,
      stars: mapIds.length,
      detections: answer.counted.length,
    };
  } catch (reason) {
    // A companion where the map of its star sees nothing: a run says which.
    if (reason instanceof RangeError) return null;
    throw reason;
  }
}
