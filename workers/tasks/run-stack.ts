import { marginalWeights, type Population, type PopulationWeights } from '@/lib/population';
import type { RunInputs } from '@/lib/schemas/runs';
import type { MapGrid } from '@/lib/sensitivity';
import { valuesOnGrid } from '@/models/map-on-grid';
import type { PassingMap } from '@/models/map-stream';
import type { MapShelf } from './map-shelf';
import { flaggedMasses, type MapDigests } from './run-maps';
import type { SampleStar } from './run-sample';

export interface MapStack {
  /** Shape [star, mass, semiMajorAxis], round(65535 C), on the run's grid. */
  maps: Uint16Array;
  stars: RunInputs['stars'];
  /** Mean over the stars of the population's share outside their maps. */
  shareOutsideMaps: number;
  /** Mean over the stars of the population's share at masses that the cooling relation flags. */
  shareFlaggedCooling: number;
  reach: {
    massMinMjup: number;
    massMaxMjup: number;
    semiMajorAxisMinAu: number;
    semiMajorAxisMaxAu: number;
  };
}

/**
 * Reads the stars' maps and lays them on the run's grid, encoded as the page will get them: worker
 * and page then start from the same numbers.
 *
 * @param hostMassMsun shape [star] [M_Sun], where the population depends on it
 */
export async function stackMaps(
  shelf: Pick<MapShelf, 'stream'>,
  sampleStars: SampleStar[],
  digests: MapDigests,
  grid: MapGrid,
  population: Population,
  hostMassMsun: Float64Array | undefined,
): Promise<MapStack> {
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const maps = new Uint16Array(sampleStars.length * size);
  const stars: MapStack['stars'] = [];
  const share = shareCounter(population, grid);
  const reach = reachOf(grid);
  const keys = sampleStars.map(({ starId }) => digests.get(starId) as string);
  await shelf.stream(keys, (map, place) => {
    const star = sampleStars[place];
    maps.set(valuesOnGrid(map, grid), place * size);
    narrow(reach, map);
    const host = hostMassMsun?.[place];
    share.count(map, population.form === 'mass-ratio' ? host : undefined);
    stars.push({
      starId: star.starId,
      name: star.name,
      surveys: star.entries.map(({ survey }) => survey.row.id),
      mapId: map.id,
      mapDigest: map.digest,
      mapChecksum: map.checksum,
      ...(host !== undefined && { hostMassMsun: host }),
    });
  });
  return { maps, stars, reach, ...share.means() };
}

function reachOf(grid: MapGrid): MapStack['reach'] {
  return {
    massMinMjup: grid.massMjup[0],
    massMaxMjup: grid.massMjup[grid.massMjup.length - 1],
    semiMajorAxisMinAu: grid.semiMajorAxisAu[0],
    semiMajorAxisMaxAu: grid.semiMajorAxisAu[grid.semiMajorAxisAu.length - 1],
  };
}

function narrow(reach: MapStack['reach'], row: PassingMap): void {
  const last = (axis: Float64Array) => axis[axis.length - 1];
  reach.massMinMjup = Math.max(reach.massMinMjup, row.massMjup[0]);
  reach.massMaxMjup = Math.min(reach.massMaxMjup, last(row.massMjup));
  reach.semiMajorAxisMinAu = Math.max(reach.semiMajorAxisMinAu, row.semiMajorAxisAu[0]);
  reach.semiMajorAxisMaxAu = Math.min(reach.semiMajorAxisMaxAu, last(row.semiMajorAxisAu));
}

/** Weights per axes and host mass: most maps of a run share theirs. */
function shareCounter(population: Population, grid: MapGrid) {
  const known = new Map<string, PopulationWeights>();
  const texts = new WeakMap<Float64Array, string>();
  // Neighbours hold the same axis as one object, so that its text is made once.
  const textOf = (axis: Float64Array) => {
    const text = texts.get(axis) ?? axis.join();
    texts.set(axis, text);
    return text;
  };
  const weightsOn = (massMjup: Float64Array, semiMajorAxisAu: Float64Array, host?: number) => {
    const key = `${host}|${textOf(massMjup)}|${textOf(semiMajorAxisAu)}`;
    const weights =
      known.get(key) ?? marginalWeights({ massMjup, semiMajorAxisAu }, population, host);
    known.set(key, weights);
    return weights;
  };
  let outside = 0;
  let flagged = 0;
  let stars = 0;
  return {
    count(row: PassingMap, host: number | undefined): void {
      const common = weightsOn(grid.massMjup, grid.semiMajorAxisAu, host);
      const own = weightsOn(row.massMjup, row.semiMajorAxisAu, host);
      stars++;
      outside += Math.max(common.shareOutsideMap, own.shareOutsideMap);
      const masses = new Set(flaggedMasses(row));
      row.massMjup.forEach((mass, i) => {
        if (masses.has(mass)) flagged += own.mass[i];
      });
    },
    means: () => ({ shareOutsideMaps: outside / stars, shareFlaggedCooling: flagged / stars }),
  };
}
