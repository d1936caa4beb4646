import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { CompletenessMapRow, type SurveyRow, TargetRow } from '@/models';
import { unpackMap } from '@/models/map-values';
import { differences, readChecks } from '../reference/support/check-file';
import {
  type CurveInputs,
  contrastCurve,
  type StarCheckInputs,
} from '../reference/support/check-inputs';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith, type TestCollaboration } from '../support/people';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

type Entry = StarCheckInputs & { curve: string; offset_mag: number; mass_sun: number };
interface Setup {
  masses_mjup: number[];
  axes_au: number[];
  curves: Record<string, CurveInputs>;
}

const twelve = readChecks('survey-maps');
const twelveSetup = twelve[0].inputs as unknown as Setup & { stars: Entry[] };
const pair = readChecks('two-surveys');
const pairSetup = pair[0].inputs as unknown as Setup & {
  surveys: { name: string; stars: Entry[] }[];
};
const inference = readChecks('survey-inference');

const FULL = {
  eccentricity: { law: 'beta', alpha: 0.867, beta: 3.03 },
  threshold: 'smooth',
  // The outside values carry the error of five age nodes a side.
  ageNodesPerSide: 5,
  massMjup: { min: 1, max: 60, count: 20 },
  semiMajorAxisAu: { min: 3, max: 600, count: 20 },
};
const PLAIN = { ...FULL, eccentricity: { law: 'circular' }, threshold: 'hard' };

async function storeStars(survey: SurveyRow, setup: Setup, stars: Entry[], isExact: boolean) {
  for (const star of stars) {
    const curve = contrastCurve(setup.curves[star.curve], star.band, 5, star.offset_mag);
    await buildTarget(survey, {
      name: star.name,
      distancePc: star.distance_pc,
      distanceErrorPc: isExact ? 0 : star.distance_error_pc,
      ageMyr: star.age_myr,
      ageLowerMyr: isExact ? null : star.age_lo_myr,
      ageUpperMyr: isExact ? null : star.age_hi_myr,
      hostMassMsun: star.mass_sun,
      magnitudes: { [star.band]: { valueMag: star.magnitude, errorMag: null } },
      curves: [
        {
          band: star.band,
          separationArcsec: [...curve.separationArcsec],
          contrastMag: [...curve.contrastMag],
          coverage: curve.coverage ? [...curve.coverage] : null,
        },
      ],
    });
  }
}

async function storedMap(survey: SurveyRow, name: string): Promise<number[][]> {
  const target = await TargetRow.findOne({
    where: { surveyId: survey.id, name },
    rejectOnEmpty: true,
  });
  const row = await CompletenessMapRow.findByPk(target.mapId as string, { rejectOnEmpty: true });
  const values = unpackMap(row.nodeValues);
  const columns = row.semiMajorAxisAu.length;
  return row.massMjup.map((_, i) => [...values.subarray(i * columns, (i + 1) * columns)]);
}

/** Stored with 16 bits: half a step more than the engine alone is allowed. */
const ENCODING = 7.7e-6;

let actor: Actor;
let collaboration: TestCollaboration;

beforeAll(async () => {
  const made = await createCollaborationWith(['owner']);
  collaboration = made.collaboration;
  actor = await actorOf(made.people.owner, collaboration);
  await startWorker({ threads: 2 });
});
afterAll(killWorkers);

async function analyse(surveys: SurveyRow[], given: Partial<AnalysisRecipe>) {
  const population = await buildPopulation(collaboration.id);
  const recipe = recipeOf(surveys, population, given);
  const analysis = await buildAnalysis(collaboration.id, recipe, actor.personId);
  const { run, job } = await runToEnd(actor, `A-${analysis.number}`);
  expect(job.fault).toBeNull();
  if (!run.result || !run.inputs) throw new Error('the run has no result');
  return { result: run.result, inputs: run.inputs };
}

const expectedOf = (name: string) => {
  const check = inference.find((one) => one.name === name);
  if (!check) throw new Error(`no check "${name}"`);
  return check.expected as { upper_limit_95: number; per_star: number[]; sum: number };
};

describe('twelve stars through database, queue and worker', () => {
  let survey: SurveyRow;

  beforeAll(async () => {
    survey = await buildSurvey(collaboration.id, { name: 'Twelve', mapSettings: FULL });
    await storeStars(survey, twelveSetup, twelveSetup.stars, false);
    expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
  });

  it('gives the full maps of the check within its tolerance', async () => {
    for (const check of twelve.filter(({ name }) => name.startsWith('map full'))) {
      const map = await storedMap(survey, (check.inputs as { star: string }).star);
      const tolerance = { ...check.tolerance, abs: (check.tolerance.abs ?? 0) + ENCODING };
      expect(differences(map, check.expected, tolerance)).toEqual([]);
    }
  });

  it('gives the plain maps of the check within its tolerance', async () => {
    const plain = await buildSurvey(collaboration.id, { name: 'Plain', mapSettings: PLAIN });
    await storeStars(plain, twelveSetup, twelveSetup.stars, true);
    expect((await untilEnded(await askForMaps(plain))).status).toBe('done');
    for (const check of twelve.filter(({ name }) => name.startsWith('map plain'))) {
      const map = await storedMap(plain, (check.inputs as { star: string }).star);
      const tolerance = { ...check.tolerance, abs: (check.tolerance.abs ?? 0) + ENCODING };
      expect(differences(map, check.expected, tolerance)).toEqual([]);
    }
  });

  it('gives mean completeness and limits of the check, Poisson and Bernoulli', async () => {
    const perStar = expectedOf('mean completeness power-law A full').per_star;
    const rate = await analyse([survey], {
      likelihood: 'mean-number',
      prior: { law: 'uniform', max: 2 },
    });
    const probabilityOf = new Map(
      rate.result.starTable.map(({ name, probability }) => [name, probability]),
    );
    twelveSetup.stars.forEach(({ name }, i) => {
      const found = probabilityOf.get(name) as number;
      expect(Math.abs(found - perStar[i])).toBeLessThan(5e-4 + 5e-3 * perStar[i]);
    });
    const poisson = expectedOf('poisson power-law A 0 detections uniform').upper_limit_95;
    expect(Math.abs(rate.result.answer.limit / poisson - 1)).toBeLessThan(5e-3);
    const fraction = await analyse([survey], {});
    const bernoulli = expectedOf('bernoulli power-law A 0 detections uniform').upper_limit_95;
    expect(Math.abs(fraction.result.answer.limit / bernoulli - 1)).toBeLessThan(5e-3);
    expect(fraction.result.zero.limit).toBe(fraction.result.answer.limit);
    expect(fraction.result.levels.find(({ level }) => level === 0.95)?.hostFraction).toBe(
      fraction.result.answer.limit,
    );
  });

  it('counts two detections, and sets them aside when asked to', async () => {
    const found = [
      { star: 'Star 03', massMjup: 11, semiMajorAxisAu: 42 },
      { star: 'Star 08', massMjup: 14, semiMajorAxisAu: 95 },
    ];
    for (const { star, ...place } of found) {
      const target = await TargetRow.findOne({
        where: { surveyId: survey.id, name: star },
        rejectOnEmpty: true,
      });
      await buildCompanion(target, place);
    }
    const { result } = await analyse([survey], {});
    const two = expectedOf('bernoulli power-law A 2 detections uniform').upper_limit_95;
    expect(result.counted.map(({ name }) => name)).toEqual(['Star 03 b', 'Star 08 b']);
    expect(Math.abs(result.answer.limit / two - 1)).toBeLessThan(5e-3);
    const none = expectedOf('bernoulli power-law A 0 detections uniform').upper_limit_95;
    expect(Math.abs(result.zero.limit / none - 1)).toBeLessThan(5e-3);
    const aside = await analyse([survey], { detections: 'none' });
    expect(aside.result.counted).toEqual([]);
    expect(aside.result.answer.limit).toBe(result.zero.limit);
    expect(aside.inputs.companions).toHaveLength(2);
  });
});

describe('two surveys that share stars', () => {
  const surveys: SurveyRow[] = [];
  const limits = pair.find(({ name }) => name.startsWith('exposures and limits'))
    ?.expected as Record<string, { exposure: number; upper_limit_95: number }>;

  beforeAll(async () => {
    const other = await createCollaborationWith(['owner']);
    collaboration = other.collaboration;
    actor = await actorOf(other.people.owner, collaboration);
    for (const { name, stars } of pairSetup.surveys) {
      const survey = await buildSurvey(collaboration.id, { name, mapSettings: FULL });
      await storeStars(survey, pairSetup, stars, false);
      expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
      surveys.push(survey);
    }
  });

  it.each([
    ['default', 'same position'],
    ['same-position', 'same position'],
    ['deepest', 'deepest'],
    ['independent', 'independent'],
  ] as const)('the rule %s gives exposure and limit of the check', async (combination, row) => {
    const { result, inputs } = await analyse(surveys, {
      combination,
      likelihood: 'mean-number',
      prior: { law: 'uniform', max: 2 },
    });
    expect(result.stars).toBe(14);
    expect(result.entries).toBe(17);
    expect(Math.abs(result.exposure / limits[row].exposure - 1)).toBeLessThan(5e-3);
    expect(Math.abs(result.answer.limit / limits[row].upper_limit_95 - 1)).toBeLessThan(5e-3);
    expect(inputs.stars.map(({ name }) => name)).toEqual(
      [...inputs.stars.map(({ name }) => name)].sort(),
    );
    const total = result.depth.surveys.flatMap(({ stars }) => stars[10]);
    const seen = result.depth.semiMajorAxisAu[10];
    expect(seen).toBeGreaterThan(10);
    expect(total.reduce((sum, stars) => sum + stars, 0)).toBeLessThan(14);
  });

  it('refuses shared stars by name where the analysis asks for that', async () => {
    const population = await buildPopulation(collaboration.id);
    const recipe = recipeOf(surveys, population, { combination: 'refuse' });
    const analysis = await buildAnalysis(collaboration.id, recipe, actor.personId);
    const { job, run } = await runToEnd(actor, `A-${analysis.number}`);
    expect(job.status).toBe('failed');
    expect(job.fault).toContain('Star 03, Star 05, Star 09');
    expect(run.result).toBeNull();
  });
});
