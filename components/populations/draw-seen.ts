import type { DrawnCompanions } from '@/components/charts/companion-scatter';
import type { MapData } from '@/components/charts/map-contours';
import type { LiveSample } from '@/components/runs/live-sample';
import { drawCompanions, type Population } from '@/lib/population';
import { interpolateMap } from './interpolate-map';
import { hostMassesOf, type Spread } from './spread';

export const PLANETS = 240;
/** So many companions of a table are shown one by one; of a longer one, drawn ones. */
export const MOST_SHOWN = 480;

/** One number between 0 and 1 a planet, always the same: a dragged range must not flicker. */
const chances = Float64Array.from(
  { length: MOST_SHOWN },
  (_, i) => ((i + 1) * 0.6180339887498949) % 1,
);

/**
 * Planets of the population; each is seen with the mean completeness at its place, or, where the
 * masses are those of the star, with that of a star's own map.
 *
 * @param hosts stars on which planets of a mass ratio are placed; one of 1 solar mass without it
 */
export function drawSeen(
  population: Population,
  map: MapData | undefined,
  hosts?: { sample: LiveSample; spread: Spread },
): DrawnCompanions {
  if (population.form === 'systems' && population.massMjup.length <= MOST_SHOWN) {
    const { massMjup, semiMajorAxisAu } = population;
    return seeOn(map, {
      massMjup: Float64Array.from(massMjup),
      semiMajorAxisAu: Float64Array.from(semiMajorAxisAu),
    });
  }
  if (population.form !== 'mass-ratio') {
    return seeOn(map, drawCompanions(population, PLANETS, 'preview'));
  }
  if (!hosts) {
    const suns = new Float64Array(PLANETS).fill(1);
    return seeOn(map, drawCompanions(population, PLANETS, 'preview', suns));
  }
  const { sample, spread } = hosts;
  const star = starOfEach(spread);
  const masses = hostMassesOf(sample);
  const drawn = drawCompanions(
    population,
    PLANETS,
    'preview',
    Float64Array.from(star, (j) => masses[j]),
  );
  const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
  const isSeen = Uint8Array.from(star, (j, i) => {
    const own = { ...sample.grid, completeness: sample.maps.subarray(j * size, (j + 1) * size) };
    const seen = interpolateMap(own, drawn.massMjup[i], drawn.semiMajorAxisAu[i]) / 65_535;
    return chances[i] < seen ? 1 : 0;
  });
  return { ...drawn, isSeen };
}

/** The star of each planet: in order, each with its share of them. */
function starOfEach({ star, share }: Spread): number[] {
  let at = 0;
  let upTo = share[0];
  return Array.from({ length: PLANETS }, (_, i) => {
    while (at < star.length - 1 && (i + 0.5) / PLANETS > upTo) upTo += share[++at];
    return star[at];
  });
}

function seeOn(map: MapData | undefined, drawn: Omit<DrawnCompanions, 'isSeen'>): DrawnCompanions {
  const isSeen = Uint8Array.from(drawn.massMjup, (mass, i) =>
    map && chances[i] < interpolateMap(map, mass, drawn.semiMajorAxisAu[i]) ? 1 : 0,
  );
  return { ...drawn, isSeen };
}
