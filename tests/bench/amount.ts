import type { Resolution } from './reference';

/** How much is measured: everything in under three minutes, or quickly in under forty seconds. */
export interface Amount {
  rounds: number;
  /** The hard rule has edges that a reference follows only with many nodes. */
  resolution: Record<'smooth' | 'hard', Resolution>;
  smoothMaps: number[];
  hardMaps: number[];
  /** Surveys that are read back from the database. */
  storedMaps: number[];
}

export const FULL: Amount = {
  rounds: 7,
  resolution: {
    smooth: { ageNodesPerSide: 40, distanceNodes: 41 },
    hard: { ageNodesPerSide: 80, distanceNodes: 81 },
  },
  smoothMaps: [12, 78, 400, 5000],
  hardMaps: [12, 78],
  storedMaps: [78, 400, 5000],
};

export const QUICK: Amount = {
  rounds: 3,
  resolution: {
    smooth: { ageNodesPerSide: 30, distanceNodes: 21 },
    hard: { ageNodesPerSide: 60, distanceNodes: 41 },
  },
  smoothMaps: [12, 78, 400],
  hardMaps: [12, 78],
  storedMaps: [78, 400],
};
