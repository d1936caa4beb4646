import { InputError } from '@/lib/errors';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SystematicChange } from '@/lib/schemas/study-settings';
import { type StarChange, varyStar } from '@/lib/sensitivity/vary';
import { CoolingTableRow } from '@/models';
import { digestOf } from '@/models/digest';
import { combineMaps } from './run-maps';
import type { Sample } from './run-sample';
import { defaultChanges } from './study-changes';
import type { StudyPerformer, StudyWork } from './study-context';
import { loadRunSample } from './study-sample';
import { answerUnder } from './study-under';
import {
  makeVariations,
  type PlannedVariation,
  planVariation,
  underCooling,
  type Variation,
  type VariedMaps,
} from './study-variation';
import { labelOf } from './study-words';

const starChanges: { [Change in SystematicChange['change']]?: StarChange } = {
  'ages-young': { kind: 'ages', sigma: -1 },
  'ages-old': { kind: 'ages', sigma: 1 },
  'distances-near': { kind: 'distances', sigma: -1 },
  'distances-far': { kind: 'distances', sigma: 1 },
  'n-sigma-up': { kind: 'n-sigma', step: 1 },
  'n-sigma-down': { kind: 'n-sigma', step: -1 },
};

function variationOf(change: SystematicChange, name: string): Variation {
  const starChange = starChanges[change.change];
  if (starChange) return { name, star: (star) => varyStar(star, starChange) };
  switch (change.change) {
    case 'cooling':
      return { name, settings: underCooling(change.coolingTableId) };
    case 'threshold':
      return {
        name,
        settings: ({ threshold, ...settings }) => ({
          ...settings,
          threshold: threshold === 'hard' ? 'smooth' : 'hard',
        }),
      };
    case 'eccentricity':
      return { name, settings: (settings) => ({ ...settings, eccentricity: change.law }) };
    default:
      return { name };
  }
}

type Planned =
  | PlannedVariation
  | { name: string; rule: 'same-position' | 'deepest' | 'independent' };

/**
 * One assumption at a time against the run: the maps that it touches are made anew, and the limit is
 * asked again. The rows are not independent errors: nothing adds them up.
 */
export const performSystematics: StudyPerformer<'systematics'> = async (given, settings) => {
  const { run, collaborationId } = given;
  const sample = await loadRunSample(given);
  const tables = await CoolingTableRow.findAll({
    attributes: ['id', 'name', 'magnitudes', 'digest'],
    where: { collaborationId },
    order: [['name', 'ASC']],
  });
  const changes = settings.changes ?? defaultChanges(sample, tables, run.recipe);
  const labels = changes.map((change) => labelOf(change, tables));
  noteTables(given, changes, tables);
  const planned: Planned[] = [];
  for (const [i, change] of changes.entries()) {
    planned.push(
      change.change === 'combination'
        ? { name: labels[i], rule: change.rule }
        : await planVariation(given, sample, variationOf(change, labels[i])),
    );
  }
  const varied = planned.filter((one) => 'maps' in one);
  const made = new Map<Planned, VariedMaps>(
    (await makeVariations(given, varied)).map((maps, i) => [varied[i], maps]),
  );
  const rows: ResultOf<'systematics'>['rows'] = [];
  for (const [i, change] of changes.entries()) {
    await given.report('limits', i, changes.length);
    const plan = planned[i];
    const maps = 'rule' in plan ? await recombine(given, sample, plan) : made.get(plan);
    const { limit, ...rest } = await answerUnder(given, maps as VariedMaps);
    const ratio = limit === null ? null : limit / run.result.answer.limit;
    rows.push({ change, label: labels[i], limit, ratio, ...rest });
  }
  await given.report('limits', changes.length, changes.length);
  return {
    kind: 'systematics',
    baseline: run.result.answer.limit,
    rows,
    notes: notesOf(run.result.stars, rows),
  };
};

async function recombine(
  given: StudyWork,
  sample: Sample,
  { name, rule }: { name: string; rule: 'same-position' | 'deepest' | 'independent' },
): Promise<VariedMaps> {
  const before = given.run.inputs.stars.map(({ mapDigest }) => mapDigest);
  try {
    const byStar = await combineMaps(given.work, sample, rule, given.grid, () => Promise.resolve());
    const digests = sample.stars.map(({ starId }) => byStar.get(starId) as string);
    given.further.push({ what: `maps, ${name}`, digest: digestOf(digests) });
    const starsUnchanged = digests.filter((digest, i) => digest === before[i]).length;
    return { digests, starsUnchanged, fault: null };
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return { digests: [], starsUnchanged: 0, fault: error.message };
  }
}

function noteTables(
  { further }: StudyWork,
  changes: SystematicChange[],
  tables: CoolingTableRow[],
): void {
  for (const { id, name, digest } of tables) {
    const isUsed = changes.some((one) => one.change === 'cooling' && one.coolingTableId === id);
    if (isUsed) further.push({ what: `cooling table ${name}`, digest });
  }
}

function notesOf(
  stars: number,
  rows: { starsUnchanged: number; fault: string | null }[],
): string[] {
  const notes = ['One change at a time: the shifts are not independent errors and do not add up'];
  const untouched = rows.filter(({ fault, starsUnchanged }) => !fault && starsUnchanged === stars);
  if (untouched.length > 0) {
    const count = untouched.length === 1 ? '1 change leaves' : `${untouched.length} changes leave`;
    notes.push(
      `${count} every map as it is: the run has it so already, or nothing measured or set allows a shift`,
    );
  }
  return notes;
}
