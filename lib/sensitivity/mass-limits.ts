/**
 * Smallest mass that is seen with a given probability, along the semi-major axis.
 *
 * Above the mass that is returned the map stays at or above the share; a map that falls again at
 * high masses has no limit below the fall. Linear in log mass between the nodes.
 *
 * @param massMjup nodes, increasing [M_Jup]
 * @param columns number of nodes of the semi-major axis
 * @param completeness shape [mass, semiMajorAxis], row-major [fraction]
 * @param share 0 < share <= 1, such as 0.5
 * @returns shape [semiMajorAxis] [M_Jup]; NaN where even the highest mass is seen less often, the
 *   lowest node where all masses are seen at least so often
 * @throws RangeError for a share outside its domain and for a map of another shape
 * @example massLimits(Float64Array.of(1, 10), 1, Float64Array.of(0, 1), 0.5) // [3.1623]
 */
export function massLimits(
  massMjup: ArrayLike<number>,
  columns: number,
  completeness: ArrayLike<number>,
  share: number,
): Float64Array {
  if (!(share > 0 && share <= 1)) throw new RangeError(`share must be in (0, 1], got ${share}`);
  const rows = massMjup.length;
  if (completeness.length !== rows * columns) {
    throw new RangeError(
      `completeness must have ${rows * columns} values, got ${completeness.length}`,
    );
  }
  return Float64Array.from({ length: columns }, (_, column) => {
    const at = (row: number) => completeness[row * columns + column];
    let row = rows - 1;
    if (at(row) < share) return Number.NaN;
    while (row > 0 && at(row - 1) >= share) row -= 1;
    if (row === 0) return massMjup[0];
    const part = (share - at(row - 1)) / (at(row) - at(row - 1));
    return massMjup[row - 1] * (massMjup[row] / massMjup[row - 1]) ** part;
  });
}
