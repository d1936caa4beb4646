import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { answerFromView, viewOfStars, viewPopulation } from '@/lib/inference';
import { hostScalingOf, needsHostMass, type Population } from '@/lib/population';
import { select } from '@/lib/queue/statement';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';
import type { Adoption, AdoptionChoices, AdoptionPreview } from '@/lib/schemas/stars';
import { CollaborationRow, inTransaction, PopulationRow, RunRow } from '@/models';
import { type AdoptedValues, loadAdopted } from '@/models/adopted-values';
import { MissingInput } from '@/models/missing-input';
import { listAnalyses } from './analyses';
import { leadOf } from './lead-analysis';
import { loadSky } from './star-facts';
import { mapUnder, readMappedStar } from './star-preview-maps';
import { choose, whole } from './star-values';
import { findStar } from './stars';

/** Stars whose maps are computed while a person waits: some tens of milliseconds each. */
const MOST_STARS = 12;

type FinishedRun = RunRow & { inputs: RunInputs; result: RunResult };

async function newestLeadRun(actor: Actor) {
  const { analyses } = await listAnalyses(actor);
  const row = await CollaborationRow.findByPk(actor.collaborationId, { rejectOnEmpty: true });
  const lead = leadOf(analyses, row.settings);
  const finished = lead?.runs.find(({ limit }) => limit !== null);
  const run = finished && (await RunRow.findByPk(finished.id));
  if (!lead || !run?.result || !run.inputs) return null;
  return { lead, run: run as FinishedRun };
}

/** The adopted values as they would be. */
async function valuesAfter(
  actor: Actor,
  { quantity, choices }: AdoptionChoices,
  before: AdoptedValues,
): Promise<{ after: AdoptedValues; starIds: Set<string> }> {
  const sky = await loadSky(actor.collaborationId);
  const after = { ...before, age: new Map(before.age), distance: new Map(before.distance) };
  const starIds = new Set<string>();
  for (const { starId, choice } of choices) {
    const star = await findStar(actor, starId);
    const asked = { quantity, choice } as Pick<Adoption, 'quantity' | 'choice'>;
    const { value, source } = choose(asked, sky.entriesOf.get(star.id) ?? []);
    const held = whole(quantity, value);
    starIds.add(star.id);
    if (held === null) after[quantity].delete(star.id);
    else after[quantity].set(star.id, { value: held as never, source, table: 0 });
  }
  return { after, starIds };
}

/** Why the limit of this run cannot be told beforehand, if so. */
function findObstacle({ recipe }: RunRow, population: Population, stars: number): string | null {
  if (population.form === 'systems' || needsHostMass(population) || hostScalingOf(population)) {
    return 'Its population depends on each host’s mass or on tabulated systems: a new run tells';
  }
  if (recipe.candidates) return 'It counts open candidates by their probability: a new run tells';
  if (stars > MOST_STARS) {
    return `The maps of ${stars} of its stars would change, and at most ${MOST_STARS} are computed while you wait: a new run tells`;
  }
  return null;
}

function limitWith(
  { inputs, result, recipe }: FinishedRun,
  population: Population,
  completeness: Float64Array,
): number {
  const view = viewOfStars(population, completeness, result.shareOutsideMaps);
  const starOf = new Map(inputs.stars.map(({ starId }, i) => [starId, i]));
  const { likelihood, prior, background, credibleLevel: level } = recipe;
  const detections = result.counted.map((found) => ({
    ...found,
    star: starOf.get(found.starId) as number,
  }));
  const asked = { likelihood, prior, level, detections };
  return answerFromView(view, { ...asked, ...(background !== undefined && { background }) }).limit;
}

/** A star of the run whose value would change, with the star that it is by now. */
interface Concerned {
  index: number;
  star: RunInputs['stars'][number];
  root: string;
}

async function computeLimits(
  run: FinishedRun,
  population: Population,
  concerned: Concerned[],
  values: { before: AdoptedValues; after: AdoptedValues },
  transaction: Transaction,
): Promise<{ before: number; after: number }> {
  const grid = {
    massMjup: Float64Array.from(run.inputs.grid.massMjup),
    semiMajorAxisAu: Float64Array.from(run.inputs.grid.semiMajorAxisAu),
  };
  const seen = new Map(run.result.starTable.map((row) => [row.starId, row.probability]));
  const stored = run.inputs.stars.map(({ starId }) => seen.get(starId) ?? 0);
  const limitUnder = async (adopted: AdoptedValues) => {
    const completeness = Float64Array.from(stored);
    for (const { index, star, root } of concerned) {
      const mapped = await readMappedStar(run, star, root, adopted, transaction);
      const map = await mapUnder(mapped, grid, transaction);
      const { completenessPerStar } = viewPopulation(map, grid, population);
      completeness[index] = completenessPerStar?.[0] ?? Number.NaN;
    }
    return limitWith(run, population, completeness);
  };
  return { before: await limitUnder(values.before), after: await limitUnder(values.after) };
}

/**
 * How the limit of the lead analysis would move if values were adopted. Nothing is stored: maps of
 * the stars concerned are computed twice, with what holds now and with what would, and all other
 * stars keep what the newest run found for them.
 */
export async function previewAdoption(
  actor: Actor,
  given: AdoptionChoices,
): Promise<AdoptionPreview> {
  demand(actor, 'read');
  const before = await loadAdopted(actor.collaborationId);
  const { after, starIds } = await valuesAfter(actor, given, before);
  const found = await newestLeadRun(actor);
  const nothing = { level: null, isFraction: false, stars: 0, before: null, after: null };
  if (!found) return { lead: null, ...nothing, missing: 'No analysis has a finished run yet' };
  const { lead, run } = found;
  const roots = await select<{ id: string; root: string }>(
    'select id, root_of_star(id) as root from unnest($1::uuid[]) as id',
    [run.inputs.stars.map(({ starId }) => starId)],
  );
  const rootOf = new Map(roots.map(({ id, root }) => [id, root]));
  const concerned = run.inputs.stars.flatMap((star, index) => {
    const root = rootOf.get(star.starId);
    return root !== undefined && starIds.has(root) ? [{ star, index, root }] : [];
  });
  const told = {
    lead: { key: lead.key, name: lead.name, run: run.number },
    level: run.recipe.credibleLevel,
    isFraction: run.recipe.likelihood === 'host-fraction',
    stars: concerned.length,
  };
  const { limit } = run.result.answer;
  if (concerned.length === 0) return { ...told, before: limit, after: limit, missing: null };
  const population = await PopulationRow.findByPk(run.inputs.population.id, {
    rejectOnEmpty: true,
  });
  const obstacle = findObstacle(run, population.definition, concerned.length);
  if (obstacle !== null) return { ...told, before: limit, after: null, missing: obstacle };
  try {
    const limits = await inTransaction((transaction) =>
      computeLimits(run, population.definition, concerned, { before, after }, transaction),
    );
    return { ...told, ...limits, missing: null };
  } catch (error) {
    if (!(error instanceof MissingInput || error instanceof RangeError)) throw error;
    return { ...told, before: limit, after: null, missing: error.message };
  }
}
