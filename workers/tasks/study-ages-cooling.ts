import type { StartCondition } from '@/lib/schemas/cooling';
import { AGE_SHIFTS, COOLING_AS_RUN, COOLING_BUILT_IN } from '@/lib/schemas/stack-choices';
import type { ResultOf } from '@/lib/schemas/study-results';
import { BUILT_IN_LAW_NAME } from '@/lib/sensitivity';
import { varyStar } from '@/lib/sensitivity/vary';
import { CoolingTableRow } from '@/models';
import type { Sample } from './run-sample';
import { otherCoolingModels } from './study-changes';
import type { StudyPerformer, StudyWork } from './study-context';
import { loadRunSample } from './study-sample';
import { answerUnder } from './study-under';
import { makeVariations, planVariation, underCooling, type Variation } from './study-variation';

type Model = ResultOf<'ages-cooling'>['models'][number];
type Named = Omit<Model, 'shifts'> & { settings?: Variation['settings'] };

/** Cooling models beside the run's own where nobody names any. */
const MOST_OTHERS = 2;

/**
 * The run's maps under younger and older ages and under other cooling models, one stack for each pair:
 * they are kept with the answer, so that a page can move between them at once.
 */
export const performAgesCooling: StudyPerformer<'ages-cooling'> = async (given, settings) => {
  const { run, collaborationId } = given;
  const sample = await loadRunSample(given);
  const tables = await CoolingTableRow.findAll({
    attributes: ['id', 'name', 'magnitudes', 'digest', 'startCondition'],
    where: { collaborationId },
    order: [['name', 'ASC']],
  });
  const others = settings.coolingTableIds ?? chooseOthers(sample, tables);
  const models = [ownModel(given, sample, tables), ...others.map((id) => named(id, tables))];
  for (const { id, name, digest } of tables) {
    if (others.includes(id)) given.further.push({ what: `cooling table ${name}`, digest });
  }
  const planned = [];
  for (const model of models) {
    for (const sigma of AGE_SHIFTS) {
      planned.push(await planVariation(given, sample, variationOf(model, sigma)));
    }
  }
  const made = await makeVariations(given, planned);
  const shifts: Model['shifts'] = [];
  for (const [stack, maps] of made.entries()) {
    await given.report('limits', stack, made.length);
    const hasMaps = maps.fault === null;
    shifts.push({ ...(await answerUnder(given, maps)), hasMaps });
    if (hasMaps) given.kept.push({ stack, digests: maps.digests });
  }
  await given.report('limits', made.length, made.length);
  const perModel = AGE_SHIFTS.length;
  return {
    kind: 'ages-cooling',
    baseline: run.result.answer.limit,
    ageShifts: [...AGE_SHIFTS],
    models: models.map(({ model, name, startCondition }, i) => ({
      ...{ model, name, startCondition },
      shifts: shifts.slice(i * perModel, (i + 1) * perModel),
    })),
    notes: notesOf(run.result.stars, shifts),
  };
};

function variationOf({ name, settings }: Named, sigma: number): Variation {
  return {
    name: `${name}, ages ${sigma > 0 ? '+' : ''}${sigma} sigma`,
    ...(settings && { settings }),
    ...(sigma !== 0 && { star: (star) => varyStar(star, { kind: 'ages', sigma }) }),
  };
}

/** Tables that say what they start from, hot before cold, then other tables, then the built-in law. */
function chooseOthers(sample: Sample, tables: CoolingTableRow[]): (string | null)[] {
  const order: StartCondition[] = ['hot', 'warm', 'cold', 'unstated'];
  const rank = (id: string | null) => {
    const table = tables.find((one) => one.id === id);
    return table ? order.indexOf(table.startCondition) : order.length;
  };
  return otherCoolingModels(sample, tables)
    .sort((a, b) => rank(a) - rank(b))
    .slice(0, MOST_OTHERS);
}

/** What the run's surveys use; its start is stated where they agree in one table. */
function ownModel({ run }: StudyWork, sample: Sample, tables: CoolingTableRow[]): Named {
  const used = new Set(
    sample.surveys.map(({ row: { mapSettings } }) =>
      mapSettings.cooling.kind === 'table' ? mapSettings.cooling.coolingTableId : null,
    ),
  );
  const [only] = used;
  const table = used.size === 1 ? tables.find(({ id }) => id === only) : undefined;
  const startCondition = table?.startCondition ?? 'unstated';
  return { model: COOLING_AS_RUN, name: run.inputs.cooling, startCondition };
}

function named(id: string | null, tables: CoolingTableRow[]): Named {
  const table = tables.find((one) => one.id === id);
  return {
    model: id ?? COOLING_BUILT_IN,
    name: table?.name ?? BUILT_IN_LAW_NAME,
    startCondition: table?.startCondition ?? 'unstated',
    settings: underCooling(id),
  };
}

function notesOf(stars: number, shifts: Model['shifts']): string[] {
  const notes = ['A shift moves every star at once; errors of single ages are in the maps already'];
  const least = Math.min(...shifts.map(({ starsUnchanged }) => starsUnchanged));
  // The run's own maps stand at no shift, so one of the rows always keeps them all.
  const kept = Math.min(least, stars);
  if (kept > 0) {
    const count = kept === 1 ? '1 star keeps its map' : `${kept} stars keep their map`;
    notes.push(`${count} whatever the age and cooling model: uploaded, or without an error of age`);
  }
  return notes;
}
