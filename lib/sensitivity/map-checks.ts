import { requireMapShape } from './regrid';
import type { CompletenessMap } from './types';

/** Values this far outside 0 to 1 are rounding. */
const ROUNDING = 1e-9;
/** A fall of completeness with mass larger than this is worth showing. */
const SUSPICIOUS_FALL = 0.02;

/** A place where a heavier companion is harder to find. */
export interface CompletenessFall {
  semiMajorAxisAu: number;
  lighterMjup: number;
  heavierMjup: number;
  fall: number;
}

/**
 * Checks a map that somebody else computed, and brings rounding back to 0…1.
 *
 * @param map nodes, not modified
 * @returns the map with values in 0…1, and every place where C falls with mass by more than 0.02
 * @throws RangeError for axes not increasing and positive, a wrong shape, NaN, or a value outside
 *   0…1 by more than 1e-9, naming its place
 */
export function checkCompletenessMap(map: CompletenessMap): {
  map: CompletenessMap;
  falls: CompletenessFall[];
} {
  requireMapShape(map);
  const { massMjup, semiMajorAxisAu } = map;
  const columns = semiMajorAxisAu.length;
  const falls: CompletenessFall[] = [];
  const completeness = map.completeness.map((value, cell) => {
    const mass = Math.floor(cell / columns);
    const axis = cell % columns;
    if (!(value >= -ROUNDING && value <= 1 + ROUNDING)) {
      throw new RangeError(
        `completeness at ${massMjup[mass]} Mjup, ${semiMajorAxisAu[axis]} AU must be between 0 and 1, got ${value}`,
      );
    }
    const fall = mass === 0 ? 0 : map.completeness[cell - columns] - value;
    if (fall > SUSPICIOUS_FALL) {
      falls.push({
        semiMajorAxisAu: semiMajorAxisAu[axis],
        lighterMjup: massMjup[mass - 1],
        heavierMjup: massMjup[mass],
        fall,
      });
    }
    return Math.min(1, Math.max(0, value));
  });
  return {
    map: {
      massMjup: Float64Array.from(massMjup),
      semiMajorAxisAu: Float64Array.from(semiMajorAxisAu),
      completeness,
    },
    falls,
  };
}
