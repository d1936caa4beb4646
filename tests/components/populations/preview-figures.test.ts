import { describe, expect, it } from 'vitest';
import { drawSeen, PLANETS } from '@/components/populations/draw-seen';
import {
  hardlySeenWords,
  shareHardlySeen,
  shareOnMeanMap,
} from '@/components/populations/hardly-seen';
import { interpolateMap } from '@/components/populations/interpolate-map';
import { limitPlane } from '@/components/populations/limit-plane';
import {
  betterStart,
  faultOnSample,
  parameterTrace,
  previewAnswer,
} from '@/components/populations/preview-figures';
import { spreadOf } from '@/components/populations/spread';
import {
  type MassRatioPopulation,
  meanCompleteness,
  populationWeights,
  type SystemsPopulation,
  toLogIndex,
} from '@/lib/population';
import { buildSample, definition } from '../runs/sample';

const sample = buildSample();
const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
const map = {
  ...sample.grid,
  completeness: Float64Array.from({ length: size }, (_, node) => {
    let sum = 0;
    for (let star = 0; star < sample.stars.length; star++) sum += sample.maps[star * size + node];
    return sum / (65_535 * sample.stars.length);
  }),
};
const asked = { definition, prior: { law: 'uniform', max: 1 } as const, credibleLevel: 0.95 };

describe('drawSeen', () => {
  it('sees the share of planets that the mean detection probability promises', () => {
    const { isSeen } = drawSeen(definition, map);
    const seen = isSeen.reduce((sum, value) => sum + value, 0);
    const expected = meanCompleteness(map.completeness, populationWeights(map, definition));
    expect(Math.abs(seen / PLANETS - expected)).toBeLessThan(4 * Math.sqrt(0.25 / PLANETS));
  });

  it('sees nothing without a map', () => {
    expect(drawSeen(definition, undefined).isSeen.every((value) => value === 0)).toBe(true);
  });
});

describe('interpolateMap', () => {
  it('gives the value of a node at the node, and 0 outside', () => {
    const columns = map.semiMajorAxisAu.length;
    const at = interpolateMap(map, map.massMjup[30], map.semiMajorAxisAu[40]);
    expect(at).toBeCloseTo(map.completeness[30 * columns + 40], 12);
    expect(interpolateMap(map, 200, 60)).toBe(0);
  });
});

describe('what hardly anybody sees', () => {
  const low = { ...definition, massMinMjup: 0.6 };

  it('is a larger share the lower the masses begin', () => {
    const share = (of: typeof definition) => shareHardlySeen(map, of, populationWeights(map, of));
    expect(share(low)).toBeGreaterThan(share(definition));
  });

  it('is told of a result from its mean map in the words of the preview, if that map suffices', () => {
    const share = shareOnMeanMap(map, low);
    expect(share).toBe(shareHardlySeen(map, low, populationWeights(map, low)));
    expect(hardlySeenWords(share ?? 0).fact).toContain(
      'mean detection probability is under 5\u2009%',
    );
    const hostScaling = { index: 1, referenceMsun: 1 };
    expect(shareOnMeanMap(map, { ...low, hostScaling })).toBeNull();
    expect(shareOnMeanMap(map, { ...low, massMinMjup: 1e4, massMaxMjup: 2e4 })).toBeNull();
  });

  it('betterStart begins where the share is under 1 %', () => {
    const dull = { ...map, completeness: map.completeness.map((seen) => (seen < 0.08 ? 0 : 1)) };
    const near = { ...low, semiMajorAxisMinAu: 50, semiMajorAxisMaxAu: 70 };
    const start = betterStart(sample, dull, near);
    expect(start?.share).toBeLessThan(0.01);
    expect(start?.start).toBeGreaterThan(0.6);
    expect(start?.definition).toMatchObject({ massMinMjup: start?.start });
  });
});

const withMasses = {
  ...sample,
  stars: sample.stars.map((star, j) => ({ ...star, hostMassMsun: 0.4 + 0.03 * j })),
};
const ratio: MassRatioPopulation = {
  form: 'mass-ratio',
  massRatioMin: 0.002,
  massRatioMax: 0.02,
  massRatioIndex: -0.5,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  semiMajorAxis: { shape: 'power-law', index: 0.2 },
};

describe('a population in the mass ratio', () => {
  it('has an answer only where every star has a mass, and the fault names the stars', () => {
    expect(previewAnswer(sample, { ...asked, definition: ratio })).toBeNull();
    expect(faultOnSample(sample, ratio)).toContain('Star 0');
    expect(previewAnswer(withMasses, { ...asked, definition: ratio })?.zero).not.toBeNull();
  });

  it('is spread over the stars so that the weights give the mean detection probability', () => {
    const same = {
      ...sample,
      stars: sample.stars.map((star) => ({ ...star, hostMassMsun: 0.8 })),
    };
    const spread = spreadOf(same, map, ratio);
    const view = previewAnswer(same, { ...asked, definition: ratio })?.view;
    const mean = spread ? meanCompleteness(spread.map.completeness, spread.weights) : Number.NaN;
    expect(mean / ((view?.exposure ?? 0) / same.stars.length)).toBeCloseTo(1, 3);
  });

  it('sees the share of planets that its mean detection probability promises', () => {
    const spread = spreadOf(withMasses, map, ratio);
    if (spread === null) throw new Error('every star has a mass');
    const { isSeen } = drawSeen(ratio, spread.map, { sample: withMasses, spread });
    const seen = isSeen.reduce((sum, value) => sum + value, 0) / PLANETS;
    const view = previewAnswer(withMasses, { ...asked, definition: ratio })?.view;
    const expected = (view?.exposure ?? 0) / withMasses.stars.length;
    expect(Math.abs(seen - expected)).toBeLessThan(4 * Math.sqrt(0.25 / PLANETS));
  });
});

describe('a rate that scales with the host mass', () => {
  it('weighs the mean map by the rate of each star', () => {
    const scaled = { ...definition, hostScaling: { index: 1.5, referenceMsun: 1 } };
    const spread = spreadOf(withMasses, map, scaled);
    const rates = withMasses.stars.map(({ hostMassMsun }) => hostMassMsun ** 1.5);
    const exposure = previewAnswer(withMasses, { ...asked, definition: scaled })?.view.exposure;
    const mean = spread ? meanCompleteness(spread.map.completeness, spread.weights) : Number.NaN;
    const whole = rates.reduce((sum, rate) => sum + rate, 0);
    expect((mean * whole) / (exposure ?? 0)).toBeCloseTo(1, 9);
  });
});

describe('systems from a table', () => {
  const systems: SystemsPopulation = {
    form: 'systems',
    weight: [2, 1, 1],
    companionSystem: [0, 0, 1],
    massMjup: [5, 0.6, 12],
    semiMajorAxisAu: [60, 900, 100],
  };

  it('shows each companion of a short table', () => {
    expect(Array.from(drawSeen(systems, map).massMjup)).toEqual([5, 0.6, 12]);
  });

  it('counts by weight what is hardly seen', () => {
    const spread = spreadOf(sample, map, systems);
    if (spread === null) throw new Error('systems need no mass');
    // The companion of 0.6 Jupiter masses at 900 AU is one of two in the system that weighs 2.
    expect(shareHardlySeen(spread.map, systems, spread.weights)).toBeCloseTo(2 / 5, 12);
  });
});

describe('parameterTrace', () => {
  it('holds the limit that each value gives on its own', () => {
    const shaped = {
      form: 'shaped' as const,
      massMinMjup: 2,
      massMaxMjup: 30,
      semiMajorAxisMinAu: 20,
      semiMajorAxisMaxAu: 300,
      mass: { shape: 'power-law' as const, index: -0.3 },
      semiMajorAxis: { shape: 'log-normal' as const, median: 60, sigmaDex: 0.4 },
    };
    const trace = parameterTrace(
      sample,
      { ...asked, definition: shaped },
      { part: 'semiMajorAxis', field: 'sigmaDex' },
      [0.2, 0.6],
    );
    const wide = { ...shaped, semiMajorAxis: { ...shaped.semiMajorAxis, sigmaDex: 0.6 } };
    const own = previewAnswer(sample, { ...asked, definition: wide })?.withDetections?.limit ?? 1;
    expect(trace.limits[1] / own).toBeCloseTo(1, 12);
    expect(trace.limits[0]).toBeLessThan(trace.limits[1]);
  });
});

describe('limitPlane', () => {
  it('holds the limit that each pair of indices gives on its own', () => {
    const ends = { massIndex: [-2, 0], semiMajorAxisIndex: [-1, 0.5] } as const;
    const plane = limitPlane(sample, asked, {
      massIndex: [...ends.massIndex],
      semiMajorAxisIndex: [...ends.semiMajorAxisIndex],
    });
    const corner = previewAnswer(sample, {
      ...asked,
      definition: {
        ...definition,
        massIndex: toLogIndex(-2, 'linear'),
        semiMajorAxisIndex: toLogIndex(0.5, 'linear'),
      },
    })?.withDetections;
    const columns = plane?.semiMajorAxisIndex.length ?? 0;
    expect((plane?.limit[columns - 1] ?? 0) / (corner?.limit ?? 1)).toBeCloseTo(1, 9);
  });

  it('takes the mass ratio and the scaling with the host mass along', () => {
    const scaled = { ...ratio, hostScaling: { index: 1, referenceMsun: 1 } };
    const plane = limitPlane(
      withMasses,
      { ...asked, definition: scaled },
      { massIndex: [-1.5, -1], semiMajorAxisIndex: [-0.8, 0] },
    );
    const present = previewAnswer(withMasses, { ...asked, definition: scaled })?.withDetections;
    // First column: linear index −0.8, stored 0.2; first row: −1.5, stored −0.5.
    expect((plane?.limit[0] ?? 0) / (present?.limit ?? 1)).toBeCloseTo(1, 9);
  });
});
