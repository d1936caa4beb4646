import { logSpacedAxis } from '@/lib/numerics/grid';
import { createRandom } from '@/lib/numerics/random';
import type { PowerLawPopulation } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';

export const GRID: MapGrid = {
  massMjup: logSpacedAxis(0.5, 80, 28),
  semiMajorAxisAu: logSpacedAxis(1, 1000, 32),
};

/** Smooth maps that rise with mass and have an inner and an outer edge in semi-major axis. */
export function buildMaps(stars: number, seed = 'maps'): { maps: Float64Array; stars: number } {
  const random = createRandom(seed);
  const [rows, columns] = [GRID.massMjup.length, GRID.semiMajorAxisAu.length];
  const maps = new Float64Array(stars * rows * columns);
  for (let star = 0; star < stars; star++) {
    const middle = 2 + 12 * random.uniform();
    const inner = 8 + 30 * random.uniform();
    const outer = 150 + 400 * random.uniform();
    const top = 0.5 + 0.45 * random.uniform();
    for (let i = 0; i < rows; i++) {
      const mass = 1 / (1 + (middle / GRID.massMjup[i]) ** 2.5);
      for (let j = 0; j < columns; j++) {
        const a = GRID.semiMajorAxisAu[j];
        const seen = 1 / (1 + (inner / a) ** 3) / (1 + (a / outer) ** 3);
        maps[(star * rows + i) * columns + j] = top * mass * seen;
      }
    }
  }
  return { maps, stars };
}

export function buildPowerLaw(overrides: Partial<PowerLawPopulation> = {}): PowerLawPopulation {
  return {
    form: 'power-law',
    massMinMjup: 2,
    massMaxMjup: 60,
    semiMajorAxisMinAu: 5,
    semiMajorAxisMaxAu: 400,
    massIndex: -0.4,
    semiMajorAxisIndex: 0.2,
    ...overrides,
  };
}
