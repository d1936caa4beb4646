import type { SystemsPopulation } from '@/lib/population';

/** What a table of systems holds, for the eye. */
export interface SystemsFacts {
  systems: number;
  companions: number;
  /** Share of the systems, by weight, that have so many companions; the last holds the rest. */
  byCompanions: { companions: number; isMore: boolean; systems: number; share: number }[];
  hasEqualWeights: boolean;
  /** Smallest and largest weight over the sum of all. */
  weightShares: [number, number];
  /** Mean number of companions of a system, by weight. */
  meanCompanions: number;
}

const MOST_LISTED = 5;

export function factsOfSystems(population: SystemsPopulation): SystemsFacts {
  const { weight, companionSystem } = population;
  const total = weight.reduce((sum, own) => sum + own, 0);
  const held = new Int32Array(weight.length);
  for (const system of companionSystem) held[system] += 1;
  const most = held.reduce((a, b) => Math.max(a, b), 0);
  const rows = Math.min(most, MOST_LISTED);
  const byCompanions = Array.from({ length: rows + 1 }, (_, companions) => ({
    companions,
    isMore: companions === MOST_LISTED && most > MOST_LISTED,
    systems: 0,
    share: 0,
  }));
  let meanCompanions = 0;
  weight.forEach((own, system) => {
    const row = byCompanions[Math.min(held[system], rows)];
    row.systems += 1;
    row.share += own / total;
    meanCompanions += (own / total) * held[system];
  });
  const least = weight.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const heaviest = weight.reduce((a, b) => Math.max(a, b), 0);
  return {
    systems: weight.length,
    companions: companionSystem.length,
    byCompanions,
    hasEqualWeights: heaviest - least <= 1e-9 * heaviest,
    weightShares: [least / total, heaviest / total],
    meanCompanions,
  };
}
