import { type FloatFormat, npyOfNumbers, type WrittenMaps } from '@/lib/formats';
import type { FinishedRun } from '../export-limits';
import { runProvenance } from './provenance';
import { mapsInOrder } from './stored-maps';

/** The maps of a run's stars on its grid, in the order of its sums: the numbers that it integrated. */
export function mapsOfRun(run: FinishedRun, format: FloatFormat): WrittenMaps {
  const { grid, stars } = run.inputs;
  const axes = {
    massMjup: Float64Array.from(grid.massMjup),
    semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
  };
  return {
    title: `Completeness maps of ${run.analysis}, run ${run.number}`,
    ...grid,
    targets: stars.map(({ name }) => name),
    isCube: true,
    format,
    provenance: runProvenance(run),
    maps: () =>
      mapsInOrder(
        run.collaborationId,
        stars.map(({ mapId }) => mapId),
        axes,
      ),
  };
}

/** The mean of a run's maps over its stars. */
export function combinedMapOfRun(run: FinishedRun, format: FloatFormat): WrittenMaps {
  const { massMjup, semiMajorAxisAu, completeness } = run.result.meanMap;
  return {
    title: `Mean completeness over the stars of ${run.analysis}, run ${run.number}`,
    massMjup,
    semiMajorAxisAu,
    targets: null,
    isCube: false,
    format,
    provenance: [...runProvenance(run), ['map', `mean of ${run.result.stars} stars`]],
    async *maps() {
      yield completeness.flat();
    },
  };
}

/** The posterior as doubles, [point, 3]: value, density, cumulative. */
export function posteriorArray({ result }: FinishedRun): Uint8Array {
  const { value, density, cumulative } = result.answer.curve;
  const rows = value.flatMap((_, i) => [value[i], density[i], cumulative[i]]);
  return npyOfNumbers(rows, [value.length, 3]);
}
