import type { CompanionRecord, KnownMap } from './kinds';
import { foldName } from './names';
import type { TableReading } from './reading';
import { quoteFound } from './reports';

/** Index of the cell that holds a value, and the share of the way through it in the logarithm. */
function locate(nodes: number[], value: number): { index: number; share: number } | null {
  const last = nodes.length - 1;
  if (last < 1 || value < nodes[0] || value > nodes[last]) return null;
  let index = nodes.findIndex((node, i) => i > 0 && value <= node) - 1;
  index = Math.max(index, 0);
  const width = Math.log(nodes[index + 1] / nodes[index]);
  return { index, share: Math.log(value / nodes[index]) / width };
}

/**
 * Completeness between the nodes of a map, linear in the logarithms of mass and semi-major axis.
 *
 * @returns the completeness, 0 to 1, or null outside the map
 */
export function completenessAt(
  map: KnownMap,
  massMjup: number,
  semiMajorAxisAu: number,
): number | null {
  const mass = locate(map.massMjup, massMjup);
  const axis = locate(map.semiMajorAxisAu, semiMajorAxisAu);
  if (mass === null || axis === null) return null;
  const width = map.semiMajorAxisAu.length;
  const at = (i: number, j: number) => map.completeness[(mass.index + i) * width + axis.index + j];
  const lower = at(0, 0) * (1 - axis.share) + at(0, 1) * axis.share;
  const upper = at(1, 0) * (1 - axis.share) + at(1, 1) * axis.share;
  return lower * (1 - mass.share) + upper * mass.share;
}

const range = (nodes: number[]): string => `${nodes[0]} to ${nodes[nodes.length - 1]}`;

function findMap(maps: ReadonlyMap<string, KnownMap>, target: string): KnownMap | undefined {
  const exact = maps.get(target);
  if (exact !== undefined) return exact;
  const fold = foldName(target);
  for (const [name, map] of maps) if (foldName(name) === fold) return map;
  return undefined;
}

/** Warns of a companion that the map of its star cannot count. */
export function tellAboutMap(
  reading: TableReading,
  row: number,
  companion: CompanionRecord,
  maps: ReadonlyMap<string, KnownMap> | undefined,
): void {
  const { massMjup, semiMajorAxisAu, status, target } = companion;
  const map = maps === undefined ? undefined : findMap(maps, target);
  if (map === undefined || massMjup === null || semiMajorAxisAu === null) return;
  if (status === 'background') return;
  const completeness = completenessAt(map, massMjup, semiMajorAxisAu);
  const name = quoteFound(`${target} ${companion.companion}`);
  if (completeness === null) {
    const isAxisOutside = locate(map.semiMajorAxisAu, semiMajorAxisAu) === null;
    const where = isAxisOutside
      ? `at ${semiMajorAxisAu} AU lies outside the completeness map of its star (${range(map.semiMajorAxisAu)} AU)`
      : `of ${massMjup} Mjup lies outside the completeness map of its star (${range(map.massMjup)} Mjup)`;
    const message = `${name} ${where}; it cannot count in an analysis`;
    reading.notes.warn('outside-map', message, reading.place(row));
  } else if (completeness === 0) {
    const message = `The map of ${quoteFound(target)} says that a companion of ${massMjup} Mjup at ${semiMajorAxisAu} AU could not be seen; check the map or the companion`;
    reading.notes.warn('zero-completeness', message, reading.place(row));
  }
}
