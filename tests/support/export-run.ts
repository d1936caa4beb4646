import { type AnalysisRecipe, analysisRecipeSchema } from '@/lib/schemas/analyses';
import { type RunInputs, runResultSchema } from '@/lib/schemas/runs';
import { decodeMap, ENGINE_VERSION, encodeMap } from '@/lib/sensitivity';
import type { FinishedRun } from '@/lib/services/export-limits';
import answerRun from '@/workers/compute/answer-run';
import { assembleResult, countCompanions } from '@/workers/tasks/run-result';
import { POPULATION } from './population';

const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;
const digest = 'ab'.repeat(32);

/** Names that containers stumble over: accents, signs of LaTeX and CSV, a leading asterisk. */
export const AWKWARD_NAMES = [
  '* alf Cen',
  'Lafrenière #3',
  'A & B_1, 50 %',
  '[FLG2003] 7',
  '51 Eri',
];

const grid = {
  massMjup: Float64Array.of(1, 2, 4, 8, 16, 32, 64),
  semiMajorAxisAu: Float64Array.of(5, 10, 20, 40, 80, 160, 320, 640),
};

/** One star's map, as it is stored: heavier and nearer to 60 au is easier to see. */
export function mapOfStar(star: number): Float64Array {
  const values = [...grid.massMjup].flatMap((mass) =>
    [...grid.semiMajorAxisAu].map(
      (axis) =>
        ((star + 1) / AWKWARD_NAMES.length) *
        (mass / (mass + 4)) *
        Math.exp(-(Math.log(axis / 60) ** 2) / 2),
    ),
  );
  return decodeMap(encodeMap(Float64Array.from(values)));
}

/** A finished run of five stars and one detection, computed by the worker's own function. */
export function buildExportRun(changes: Partial<AnalysisRecipe> = {}): FinishedRun {
  const recipe = analysisRecipeSchema.parse({
    surveyIds: [id(1)],
    populationId: id(2),
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
    ...changes,
  });
  const stars = AWKWARD_NAMES.map((name, i) => ({
    starId: id(100 + i),
    name,
    surveys: [id(1)],
    mapId: id(200 + i),
    mapDigest: digest,
    mapChecksum: digest,
  }));
  const companion = {
    companionIds: [id(300)],
    name: '51 Eri b',
    starId: id(104),
    star: '51 Eri',
    massMjup: 8,
    massErrorsMjup: [1, 2] as [number, number],
    semiMajorAxisAu: 40,
    semiMajorAxisErrorsAu: null,
  };
  const inputs: RunInputs = {
    engineVersion: ENGINE_VERSION,
    seed: '0123456789abcdef',
    grid: { massMjup: [...grid.massMjup], semiMajorAxisAu: [...grid.semiMajorAxisAu] },
    population: { id: id(2), key: 'P-2', version: 1, name: 'Shallow', digest },
    surveys: [{ id: id(1), slug: 'plover', name: 'Plover', position: 1, entries: stars.length }],
    combination: 'one survey, every star once',
    cooling: 'built-in approximate cooling law',
    eccentricity: 'eccentricity from Beta(0.867, 3.03)',
    threshold: 'chance to be seen rises through one half at the contrast limit, Gaussian noise',
    stars,
    companions: [companion],
    undecided: [],
    leftOut: [{ name: 'HD 1', survey: 'Plover', reason: 'no curve and no map' }],
  };
  const counted = countCompanions([companion], inputs, POPULATION, recipe);
  const output = answerRun({
    maps: Uint16Array.from(stars.flatMap((_, i) => [...encodeMap(mapOfStar(i))])),
    grid,
    population: POPULATION,
    likelihood: recipe.likelihood,
    prior: recipe.prior,
    credibleLevel: recipe.credibleLevel,
    detections: counted.counted.map(({ name }, i) => ({ name, star: counted.detectedStars[i] })),
    surveysOfStar: stars.map(() => [0]),
    surveys: 1,
  });
  const result = assembleResult({
    inputs,
    recipe,
    population: POPULATION,
    stack: { shareOutsideMaps: 0, shareFlaggedCooling: 0 },
    counted,
    candidates: { treatment: undefined, counted: [], kept: null, stated: undefined },
    warnings: [],
    output,
    grid,
  });
  return {
    id: id(3),
    collaborationId: id(4),
    analysis: 'A-3',
    analysisName: 'Plover alone',
    number: 18,
    seed: inputs.seed,
    finishedAt: '2026-01-02T03:04:05.000Z',
    inputsDigest: digest,
    hasOlderInputs: false,
    recipe,
    population: POPULATION,
    inputs,
    result: runResultSchema.parse(result),
    resultDigest: digest,
    engineVersion: ENGINE_VERSION,
  };
}
