import type { LiveSample } from '@/components/runs/live-sample';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { DEFAULT_GRID } from '@/lib/sensitivity';

export const definition: PowerLawDefinition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -0.3,
  semiMajorAxisIndex: 0.4,
};

/** Invented stars: heavier and closer to 60 au is easier to see, more so for later stars. */
export function buildSample(stars = 40): LiveSample {
  const grid = DEFAULT_GRID();
  const rows = grid.massMjup.length;
  const columns = grid.semiMajorAxisAu.length;
  const maps = new Uint16Array(stars * rows * columns);
  for (let star = 0; star < stars; star++) {
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const near = Math.exp(-((Math.log(grid.semiMajorAxisAu[column] / 60) / 1.1) ** 2));
        const heavy = 1 / (1 + (4 / grid.massMjup[row]) ** 2);
        const seen = near * heavy * ((star + 1) / stars);
        maps[(star * rows + row) * columns + column] = Math.round(65_535 * seen);
      }
    }
  }
  return {
    grid,
    maps,
    stars: Array.from({ length: stars }, (_, star) => ({
      starId: `star-${star}`,
      name: `Star ${star}`,
      surveys: star % 4 === 0 ? ['first', 'second'] : [star % 2 === 0 ? 'first' : 'second'],
      mapId: `map-${star}`,
      mapDigest: '',
      mapChecksum: '',
    })),
    companions: [
      { star: stars - 1, name: 'inside b', massMjup: 8, semiMajorAxisAu: 60 },
      { star: stars - 2, name: 'outside b', massMjup: 60, semiMajorAxisAu: 60 },
    ],
    open: [],
  };
}
