import { describe, expect, it } from 'vitest';
import { consequencesInSteps, finishSteps } from '@/components/runs/consequences';
import { settingFromQuery } from '@/components/runs/live-address';
import { askedOf, liveAnswer } from '@/components/runs/live-answer';
import type { LiveSample } from '@/components/runs/live-sample';
import {
  isSameSetting,
  type LiveSetting,
  settingToQuery,
  withInputs,
} from '@/components/runs/live-setting';
import { sampleUnder } from '@/components/runs/live-stacks';
import { LiveViews } from '@/components/runs/live-views';
import { meanOfSums, sumBySurvey } from '@/components/runs/survey-sums';
import type { Under } from '@/components/runs/under';
import { answerQuestion, viewPopulation } from '@/lib/inference';
import { AGE_SHIFTS, COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import { computeCompletenessMap, encodeMap, type StarInputs } from '@/lib/sensitivity';
import { varyStar } from '@/lib/sensitivity/vary';
import { COOLING, GRID, inventStar, POPULATION, settings } from '../../bench/survey';

const STARS = 40;
/** Some of the invented ages reach beyond the built-in law when all are moved by two sigma. */
const engine = { ...settings('smooth'), ageOutsideTable: 'edge' } as const;
const setting: LiveSetting = {
  definition: POPULATION,
  credibleLevel: 0.95,
  detections: 'counted',
  likelihood: 'host-fraction',
  prior: { law: 'uniform', max: 1 },
};

/** Half of the stars with errors of age that are larger on one side. */
function invent(index: number): StarInputs {
  const star = inventStar(index);
  const { age } = star;
  if ('mixture' in age || age.lowerMyr === undefined || index % 2 === 0) return star;
  const lowerMyr = Math.sqrt(age.lowerMyr * age.medianMyr);
  return { ...star, age: { ...age, lowerMyr } };
}

/** Maps made by the engine for the shift itself, encoded as they are stored. */
function mapsAt(sigma: number): Uint16Array {
  const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
  const maps = new Uint16Array(STARS * size);
  for (let star = 0; star < STARS; star++) {
    const moved = varyStar(invent(star), { kind: 'ages', sigma });
    const { map } = computeCompletenessMap(moved, COOLING, GRID, engine);
    maps.set(encodeMap(map.completeness), star * size);
  }
  return maps;
}

const stacks = AGE_SHIFTS.map(mapsAt);
/** A second model that sees half of what the first one sees, stored without its last shift. */
const halved = stacks.map((maps) => maps.map((value) => value / 2));
const sample: LiveSample = {
  grid: GRID,
  maps: stacks[2],
  stars: Array.from({ length: STARS }, (_, star) => ({
    ...{ starId: `star-${star}`, name: `Star ${star}`, mapId: '', mapDigest: '', mapChecksum: '' },
    surveys: star % 3 === 0 ? ['first', 'second'] : ['first'],
  })),
  companions: [],
  open: [],
  further: {
    ageShifts: [...AGE_SHIFTS],
    models: [COOLING_AS_RUN, 'cold'],
    stacks: [stacks, [...halved.slice(0, 4), undefined]],
  },
};

const limitOn = (maps: Uint16Array) =>
  answerQuestion({ ...askedOf(sample, setting), maps, grid: GRID, population: POPULATION }).limit;

const liveLimit = (under: Under) =>
  liveAnswer(sample, new LiveViews(sample).of(POPULATION, under), setting).answer.limit;

describe('ages and cooling models between stored maps', () => {
  it('gives the limit of the stored maps at a stored shift, exactly', () => {
    for (const [i, ageShift] of AGE_SHIFTS.entries()) {
      expect(liveLimit({ ageShift })).toBeCloseTo(limitOn(stacks[i]), 12);
    }
    expect(liveLimit({ cooling: 'cold', ageShift: 1 })).toBeCloseTo(limitOn(halved[3]), 12);
  });

  it('between two of them stays within 0.15 % of maps made for the shift itself', () => {
    const misses = [-1.7, -1.5, -0.75, -0.5, -0.2, 0.3, 0.5, 1.5, 1.8].map(
      (ageShift) => liveLimit({ ageShift }) / limitOn(mapsAt(ageShift)) - 1,
    );
    const largest = Math.max(...misses.map(Math.abs));
    expect(largest).toBeLessThan(0.0015);
    // A straight line between curved ends cannot be exact: one that were would not be asking.
    expect(largest).toBeGreaterThan(1e-5);
  });

  it('makes the same of blended maps as of weighted views', () => {
    const under = { ageShift: -0.4, cooling: 'cold' };
    const view = new LiveViews(sample).of(POPULATION, under);
    const moved = sampleUnder(sample, under);
    const whole = viewPopulation(moved.maps, GRID, POPULATION);
    // Blended maps are rounded to 16 bits.
    expect(view.exposure / whole.exposure).toBeCloseTo(1, 4);
    expect(sampleUnder(sample, under)).toBe(moved);
    expect(sampleUnder(sample, {})).toBe(sample);
    const sums = sumBySurvey(moved, [
      { id: 'first', slug: '', name: '', position: 0, entries: 40 },
      { id: 'second', slug: '', name: '', position: 1, entries: 14 },
    ]);
    const mean = meanOfSums(sums, STARS);
    const size = mean.length;
    for (const node of [0, 1000, 2222, size - 1]) {
      let sum = 0;
      for (let star = 0; star < STARS; star++) sum += moved.maps[star * size + node] / 65_535;
      expect(mean[node]).toBeCloseTo(sum / STARS, 10);
    }
  });

  it('refuses what there are no maps for, and says what', () => {
    const views = new LiveViews(sample);
    expect(() => views.of(POPULATION, { cooling: 'warm' })).toThrow(/for this cooling model/);
    expect(() => views.of(POPULATION, { cooling: 'cold', ageShift: 1.5 })).toThrow(/1\.5 sigma/);
    expect(() => views.of(POPULATION, { ageShift: 2.5 })).toThrow(RangeError);
    const alone: LiveSample = { ...sample, further: undefined };
    expect(() => new LiveViews(alone).of(POPULATION, { ageShift: 1 })).toThrow(RangeError);
  });

  it('carries the consequences: a track of ages that ends with its maps, a limit a model', () => {
    const moved = withInputs(setting, { ageShift: 0.5, cooling: 'cold' });
    const given = finishSteps(consequencesInSteps(sample, moved, setting));
    const { values = [], limits = [] } = given?.age ?? {};
    values.forEach((ageShift, i) => {
      if (ageShift > 1) expect(limits[i]).toBeNaN();
      else expect(limits[i]).toBeCloseTo(liveLimit({ ageShift, cooling: 'cold' }), 12);
    });
    expect(given?.switches.cooling).toEqual({
      [COOLING_AS_RUN]: expect.closeTo(liveLimit({ ageShift: 0.5 }), 12),
      cold: expect.closeTo(liveLimit({ ageShift: 0.5, cooling: 'cold' }), 12),
    });
    // The other tracks follow: at the present index stands the present limit.
    const { massIndex } = given ?? {};
    const view = viewPopulation(sampleUnder(sample, moved).maps, GRID, POPULATION);
    const here = liveAnswer(sample, view, setting).answer.limit;
    const at = massIndex?.values.findIndex((value) => Math.abs(value + 1.3) < 0.1) ?? -1;
    expect(massIndex?.limits[at]).toBeGreaterThan(0.9 * here);
    expect(massIndex?.limits[at]).toBeLessThan(1.1 * here);
    const without = finishSteps(
      consequencesInSteps({ ...sample, further: undefined }, setting, setting),
    );
    expect(without?.age).toBeNull();
  });
});

describe('ages and cooling in a setting', () => {
  const id = '2836422e-f9af-41a3-9021-8c9b4d7b0fd7';

  it('are left out where they are the run’s, and another setting where they are not', () => {
    expect(withInputs(setting, { ageShift: 0, cooling: COOLING_AS_RUN })).toEqual(setting);
    const moved = withInputs(setting, { ageShift: 1 });
    expect(isSameSetting(moved, setting)).toBe(false);
    expect(withInputs(moved, { cooling: id })).toEqual({ ...setting, ageShift: 1, cooling: id });
    expect(withInputs(moved, { ageShift: 0 })).toEqual(setting);
  });

  it('come back from the address; what no run can have is not taken', () => {
    const moved = withInputs(setting, { ageShift: -1.3, cooling: id });
    const query = settingToQuery(moved, setting);
    expect(query).toEqual({ age: '-1.3', cooling: id });
    expect(settingFromQuery(query, setting)).toEqual(moved);
    expect(settingFromQuery({ cooling: 'built-in' }, setting).cooling).toBe('built-in');
    for (const wrong of [{ age: '2.1' }, { age: 'old' }, { age: '' }, { cooling: 'warm' }]) {
      expect(settingFromQuery(wrong, setting)).toEqual(setting);
    }
  });
});
