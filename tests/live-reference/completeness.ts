import { meanCompleteness, type Population, populationWeights } from '@/lib/population';
import {
  type CoolingTable,
  computeCompletenessMap,
  type SensitivitySettings,
  type StarInputs,
} from '@/lib/sensitivity';
import { draw, type LiveCheck, liveCheck } from './check';

interface MeanRow {
  massMjup: number[];
  semiMajorAxisAu: number[];
  completeness: number[];
  box: [massMin: number, massMax: number, axisMin: number, axisMax: number];
  massIndex: number;
  axisIndex: number;
}

interface SimulationRow {
  hostMag: number;
  ageMyr: [lower: number, median: number, upper: number];
  distancePc: number;
  errorPc: number;
  separationArcsec: number[];
  contrastMag: number[];
  coverage: number[];
  nSigma: number;
  threshold: 'hard' | 'smooth';
  eccentricity: [alpha: number, beta: number];
  table: { massMjup: number[]; ageMyr: number[]; magnitudes: number[] };
  massMjup: number[];
  semiMajorAxisAu: number[];
  draws: number;
  seed: number;
}

const maps: MeanRow[] = draw('maps', 4, ({ between }) => {
  const massMjup = [1, 3, 9, 27, 60];
  const semiMajorAxisAu = [1, 4, 12, 50, 200, 700];
  return {
    massMjup,
    semiMajorAxisAu,
    completeness: massMjup.flatMap(() => semiMajorAxisAu.map(() => between(0, 1))),
    box: [between(0.7, 5), between(20, 70), between(0.8, 10), between(100, 900)],
    massIndex: between(-2, 1),
    axisIndex: between(-1.5, 1),
  };
});

function populationOf({ box, massIndex, axisIndex }: MeanRow): Population {
  const [massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu] = box;
  return {
    form: 'power-law',
    massMinMjup,
    massMaxMjup,
    semiMajorAxisMinAu,
    semiMajorAxisMaxAu,
    massIndex,
    semiMajorAxisIndex: axisIndex,
  };
}

const AGES_MYR = [1, 3, 10, 30, 100, 300, 1000, 3000, 10_000];
const MASSES_MJUP = [0.5, 1, 2, 5, 10, 20, 40, 80];

/** An invented relation: brighter when heavier or younger, with steps of uneven size. */
const table = {
  massMjup: MASSES_MJUP,
  ageMyr: AGES_MYR,
  magnitudes: MASSES_MJUP.flatMap((mass, i) =>
    AGES_MYR.map((age, k) => 14 - 2.2 * Math.log(mass) + 0.9 * Math.log(age) + 0.02 * i * k),
  ),
};

const simulated: SimulationRow[] = (['smooth', 'hard'] as const).map((threshold, which) => {
  const [star] = draw(`star ${threshold}`, 1, ({ between, logBetween }) => {
    const distancePc = logBetween(15, 60);
    const median = logBetween(30, 300);
    const separationArcsec = [0.15, 0.25, 0.4, 0.7, 1.2, 2, 3.5, 5];
    return {
      hostMag: between(5, 7),
      ageMyr: [median / 1.5, median, median * 1.8] as [number, number, number],
      distancePc,
      errorPc: 0.01 * distancePc,
      separationArcsec,
      contrastMag: separationArcsec.map((theta, i) => 14.5 - 5 * Math.exp(-theta) + 0.03 * i),
      coverage: separationArcsec.map((_, i) => Math.min(1, 1.3 - 0.08 * i)),
    };
  });
  return {
    ...star,
    nSigma: 5,
    threshold,
    eccentricity: [0.867, 3.03],
    table,
    massMjup: [2, 4, 8, 16, 32],
    semiMajorAxisAu: [4, 10, 25, 60, 150],
    draws: 1_000_000,
    seed: which + 1,
  };
});

/** The product's map of a star that NumPy simulates; shape [mass, semi-major axis]. */
function mapOf(row: SimulationRow): Float64Array {
  const [lowerMyr, medianMyr, upperMyr] = row.ageMyr;
  const star: StarInputs = {
    name: `${row.threshold} star`,
    hostMag: row.hostMag,
    age: { lowerMyr, medianMyr, upperMyr },
    distance: { distancePc: row.distancePc, errorPc: row.errorPc },
    curves: [
      {
        separationArcsec: Float64Array.from(row.separationArcsec),
        contrastMag: Float64Array.from(row.contrastMag),
        coverage: Float64Array.from(row.coverage),
        nSigma: row.nSigma,
        band: 'H',
      },
    ],
  };
  const relation: CoolingTable = {
    name: 'invented',
    massMjup: Float64Array.from(row.table.massMjup),
    ageMyr: Float64Array.from(row.table.ageMyr),
    magnitudes: { H: Float64Array.from(row.table.magnitudes) },
  };
  const [alpha, beta] = row.eccentricity;
  // Many age nodes, so that what is compared is the rest of the chain.
  const settings: SensitivitySettings = {
    eccentricity: { law: 'beta', alpha, beta },
    threshold: row.threshold,
    massOutsideTable: 'undetectable',
    ageOutsideTable: 'edge',
    ageNodesPerSide: 40,
  };
  const grid = {
    massMjup: Float64Array.from(row.massMjup),
    semiMajorAxisAu: Float64Array.from(row.semiMajorAxisAu),
  };
  const cooling = { kind: 'table', table: relation } as const;
  return computeCompletenessMap(star, cooling, grid, settings).map.completeness;
}

export const completenessChecks: LiveCheck[] = [
  liveCheck<MeanRow>({
    program: 'SciPy',
    what: 'mean-completeness',
    name: 'mean completeness of a map under a power law, the box partly outside the map',
    rows: maps,
    ours: (row) => {
      const grid = {
        massMjup: Float64Array.from(row.massMjup),
        semiMajorAxisAu: Float64Array.from(row.semiMajorAxisAu),
      };
      const weights = populationWeights(grid, populationOf(row));
      return meanCompleteness(Float64Array.from(row.completeness), weights);
    },
    tolerance: { rel: 1e-10, because: 'adaptive quadrature is asked for 1e-10 in each cell' },
  }),
  liveCheck<SimulationRow>({
    program: 'SciPy',
    what: 'simulated-completeness',
    name: 'completeness of two stars, a million companions in each cell',
    rows: simulated,
    ours: mapOf,
    tolerance: {
      standardErrors: 4.5,
      abs: 2e-4,
      because: 'fifty cells seldom leave 4.5 errors; a map with many age nodes is good to 2e-4',
    },
  }),
];
