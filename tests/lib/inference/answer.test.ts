import { describe, expect, it } from 'vitest';
import {
  type AnswerInputs,
  answerFromView,
  answerQuestion,
  countDetections,
  type Detection,
  exposureContributions,
  viewPopulation,
} from '@/lib/inference';
import type { Population } from '@/lib/population';
import { DEFAULT_GRID, encodeMap } from '@/lib/sensitivity';

const grid = DEFAULT_GRID();
const rows = grid.massMjup.length;
const columns = grid.semiMajorAxisAu.length;
const STARS = 12;

/** Smooth invented maps: deeper for later stars, best near 60 au; star 0 sees nothing. */
function buildMaps(): Float64Array {
  const maps = new Float64Array(STARS * rows * columns);
  for (let star = 1; star < STARS; star++) {
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < columns; j++) {
        const mass = 1 / (1 + (9 / grid.massMjup[i]) ** 3);
        const axis = Math.exp(-(Math.log(grid.semiMajorAxisAu[j] / 60) ** 2));
        maps[(star * rows + i) * columns + j] = (0.4 + 0.05 * star) * mass * axis;
      }
    }
  }
  return maps;
}

function sumMaps(maps: Float64Array): Float64Array {
  const summed = new Float64Array(rows * columns);
  for (let i = 0; i < maps.length; i++) summed[i % summed.length] += maps[i];
  return summed;
}

const population: Population = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -0.3,
  semiMajorAxisIndex: 0.4,
};

const detection = (overrides: Partial<Detection> = {}): Detection => ({
  star: 4,
  massMjup: 10,
  semiMajorAxisAu: 50,
  name: 'Found 4 b',
  ...overrides,
});

function buildInputs(overrides: Partial<AnswerInputs> = {}): AnswerInputs {
  return {
    maps: buildMaps(),
    grid,
    population,
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
    detections: [],
    level: 0.95,
    ...overrides,
  };
}

describe('answerQuestion', () => {
  it('sums the stars into the exposure and gives a limit between 0 and 1', () => {
    const answer = answerQuestion(buildInputs());
    expect(answer.stars).toBe(STARS);
    expect(answer.completenessPerStar?.[0]).toBe(0);
    const total = answer.completenessPerStar?.reduce((sum, c) => sum + c, 0);
    expect(answer.exposure).toBeCloseTo(total ?? Number.NaN, 12);
    expect(answer.limit).toBeGreaterThan(0);
    expect(answer.limit).toBeLessThan(1);
    expect(answer.posterior.cumulative(answer.limit)).toBeCloseTo(0.95, 10);
  });

  it('gives the same mean number from stacked and from summed maps', () => {
    const maps = buildMaps();
    const settings = { likelihood: 'mean-number', detections: [detection()] } as const;
    const stacked = answerQuestion(buildInputs({ ...settings, maps }));
    const summed = answerQuestion(
      buildInputs({ ...settings, maps: { summed: sumMaps(maps), stars: STARS } }),
    );
    expect(summed.completenessPerStar).toBeNull();
    expect(summed.stars).toBe(STARS);
    expect(Math.abs(summed.limit / stacked.limit - 1)).toBeLessThan(1e-12);
  });

  it('loses nothing that matters in 16-bit storage', () => {
    const maps = buildMaps();
    const exact = answerQuestion(buildInputs({ maps }));
    const stored = answerQuestion(buildInputs({ maps: encodeMap(maps) }));
    expect(Math.abs(stored.limit / exact.limit - 1)).toBeLessThan(1e-5);
  });

  it('does not change when a star that sees nothing is left out', () => {
    const maps = buildMaps();
    const without = maps.slice(rows * columns);
    const limit = answerQuestion(buildInputs({ maps })).limit;
    expect(answerQuestion(buildInputs({ maps: without })).limit).toBeCloseTo(limit, 14);
  });

  it('answers from a kept view exactly as from the maps', () => {
    const inputs = buildInputs({ detections: [detection()], level: 0.9 });
    const view = viewPopulation(inputs.maps, grid, population);
    expect(answerFromView(view, inputs).limit).toBe(answerQuestion(inputs).limit);
  });

  it('names the companion that was found where nothing can be seen', () => {
    const impossible = buildInputs({ detections: [detection({ star: 0, name: 'Found 0 b' })] });
    expect(() => answerQuestion(impossible)).toThrow(/Found 0 b .* nothing can be seen/);
  });

  it('refuses the host fraction of a summed map, and a star that is not there', () => {
    const summed = { summed: sumMaps(buildMaps()), stars: STARS };
    expect(() => answerQuestion(buildInputs({ maps: summed }))).toThrow(/not only their sum/);
    const stranger = buildInputs({ detections: [detection({ star: 99 })] });
    expect(() => answerQuestion(stranger)).toThrow(/does not hold/);
  });

  it('says that ranges where nothing can be seen constrain nothing', () => {
    const dark = { summed: new Float64Array(rows * columns), stars: STARS };
    const answer = answerQuestion(buildInputs({ maps: dark, likelihood: 'mean-number' }));
    expect(answer.posterior.constrained).toBe(false);
    expect(answer.setByPrior).toBe(true);
  });
});

describe('countDetections', () => {
  const found = [
    detection(),
    detection({ name: 'Found 4 c', massMjup: 20 }),
    detection({ name: 'Found 5 b', star: 5, massMjup: 30, semiMajorAxisAu: 300 }),
    detection({ name: 'Found 6 b', star: 6, massMjup: 30.1 }),
  ];
  const names = (detections: Detection[]) => detections.map(({ name }) => name);

  it('counts a star once for the host fraction, and says which was dropped', () => {
    const { counted, setAside } = countDetections(found, population, 'host-fraction');
    expect(names(counted)).toEqual(['Found 4 b', 'Found 5 b']);
    expect(setAside.map(({ detection: { name }, reason }) => [name, reason])).toEqual([
      ['Found 4 c', 'star-already-counted'],
      ['Found 6 b', 'outside-population'],
    ]);
  });

  it('counts every companion inside for the mean number', () => {
    const { counted, setAside } = countDetections(found, population, 'mean-number');
    expect(names(counted)).toEqual(['Found 4 b', 'Found 4 c', 'Found 5 b']);
    expect(setAside).toHaveLength(1);
  });
});

describe('exposureContributions', () => {
  it('orders the stars and counts those that carry half', () => {
    const { order, share, starsForHalf } = exposureContributions(
      Float64Array.of(0.1, 0.4, 0.2, 0.3),
    );
    expect(Array.from(order)).toEqual([1, 3, 2, 0]);
    expect(share[1]).toBeCloseTo(0.4, 14);
    expect(starsForHalf).toBe(2);
  });

  it('is zero where no star shows anything', () => {
    const { share, starsForHalf } = exposureContributions(new Float64Array(3));
    expect(Array.from(share)).toEqual([0, 0, 0]);
    expect(starsForHalf).toBe(0);
  });
});
