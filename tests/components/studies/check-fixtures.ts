import type { ResultOf } from '@/lib/schemas/study-results';

/** Invented answers with the shapes of real ones. */

const BASELINE = 0.0576;
const id = (number: number) => `00000000-0000-4000-8000-${String(number).padStart(12, '0')}`;

export function buildSystematics(): ResultOf<'systematics'> {
  const row = (
    change: ResultOf<'systematics'>['rows'][number]['change'],
    label: string,
    ratio: number | null,
    starsUnchanged = 0,
  ) => ({
    change,
    label,
    limit: ratio === null ? null : BASELINE * ratio,
    ratio,
    exposure: ratio === null ? null : 109.4 / ratio,
    fault: ratio === null ? 'Found 4 M; expected an age inside the table' : null,
    starsUnchanged,
  });
  return {
    kind: 'systematics',
    baseline: BASELINE,
    rows: [
      row({ change: 'ages-young' }, 'ages one sigma younger', 0.86, 12),
      row({ change: 'ages-old' }, 'ages one sigma older', 1.11, 12),
      row({ change: 'cooling', coolingTableId: id(9) }, 'cooling table Cold start 2', 1.47),
      row({ change: 'threshold' }, 'threshold hard for smooth, smooth for hard', 1.004),
      row({ change: 'n-sigma-down' }, 'threshold one sigma lower', null),
      row({ change: 'eccentricity', law: { law: 'circular' } }, 'circular orbits', 0.97, 287),
    ],
    notes: ['One change at a time: the shifts are not independent errors and do not add up'],
  };
}

export function buildInfluence(): ResultOf<'influence'> {
  const stars = Array.from({ length: 60 }, (_, i) => {
    const probability = 0.86 * (1 - i / 62) ** 1.6;
    const hosts = i === 7 ? ['NTY 1024+0447 b'] : [];
    const ratio = i === 7 ? 0.74 : 1 + 0.05 * probability;
    return {
      starId: id(100 + i),
      name: `NTY ${1017 + 31 * i}`,
      probability,
      hosts,
      without: { limit: BASELINE * ratio, ratio, exposure: 22 - probability },
    };
  });
  const set = (name: string, count: number, ratio: number) => ({
    name,
    stars: count,
    without: { limit: BASELINE * ratio, ratio, exposure: 22 / ratio },
  });
  return {
    kind: 'influence',
    limit: BASELINE,
    exposure: 22,
    stars,
    surveys: [
      { id: id(1), ...set('HALYARD', 30, 1.42) },
      { id: id(2), ...set('CURLEW', 30, 1.08) },
    ],
    groups: [set('Halcyon', 12, 1.13), set('Petrel', 5, 1.02)],
    halfCarriedBy: 14,
    notes: [],
  };
}

export function buildCalibration(): ResultOf<'calibration'> {
  const row = (level: number, observed: number) => ({
    level,
    observed,
    expected: level,
    standardError: Math.sqrt((level * (1 - level)) / 1000),
  });
  const bins = Array.from({ length: 20 }, (_, i) => 50 + ((i * 7) % 11) - 5);
  bins[19] += 1000 - bins.reduce((sum, count) => sum + count, 0);
  return {
    kind: 'calibration',
    surveys: 1000,
    seed: '5eed',
    parts: 4,
    ranks: {
      draws: 99,
      bins,
      chiSquare: 14.2,
      pValue: 0.77,
      ecdfDistance: 0.017,
      ecdfBand: 0.0616,
      kolmogorovP: 0.64,
    },
    coverage: [row(0.5, 0.508), row(0.68, 0.671), row(0.9, 0.906), row(0.95, 0.951)],
    atTruth: [0.1, 0.3, 0.5, 0.7, 0.9].map((rate, i) => ({
      rate,
      exact: 0.953 - 0.004 * i,
      observed: 0.95 - 0.003 * i,
      standardError: 0.0069,
    })),
    medianBias: { mean: 0.0011, standardError: 0.0021 },
    passes: true,
    verdict: 'Limits hold as often as they say: the 95 % limit held in 95.1 % of 1000 surveys',
    otherTruth: {
      population: 'Steeper in mass',
      coverage: [row(0.5, 0.61), row(0.95, 0.982)],
      verdict: 'Limits do not hold as often as they say: the 50 % limit held in 61 %',
    },
    notes: [],
  };
}

export function buildForecast(): ResultOf<'forecast'> {
  const stars = [1, 2, 4, 8, 15, 30, 60, 120];
  const none = stars.map((count) => Math.min(0.95, 3.0 / (0.38 * count + 2.2)));
  const distribution = [0.19, 0.27, 0.23, 0.15, 0.09, 0.04, 0.02, 0.01];
  return {
    kind: 'forecast',
    stars: 120,
    exposure: 45.6,
    yield: { mean: 1.96, median: 2, interval68: [0, 3] },
    distribution,
    chanceOfNone: 0.19,
    limitIfNone: none[none.length - 1],
    limitIfNoneTogether: 0.0412,
    against: {
      stars,
      limitIfNone: none,
      low: none.map((limit) => limit * 1.02),
      high: none.map((limit, i) => Math.min(0.97, limit * (1.1 + 0.12 * i))),
    },
    wantedLimit: 0.0288,
    starsNeeded: 268,
    gain: Array.from({ length: 26 }, (_, i) => ({
      name: `NTY ${2037 + 17 * i}`,
      probability: 0.83 - 0.02 * i,
      limitWithItAlone: BASELINE - 0.0004 + 0.000012 * i,
    })),
    notes: ['A forecast, no result: it holds for the assumed curves, ages and distances'],
  };
}
