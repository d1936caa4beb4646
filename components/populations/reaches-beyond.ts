import type { ListedDefinition } from '@/lib/schemas/populations';

/** Whether the ranges pass the maps; those of a mass ratio may, as each star has its own. */
export function reachesBeyond(
  definition: ListedDefinition,
  grid: { massMjup: ArrayLike<number>; semiMajorAxisAu: ArrayLike<number> },
): boolean {
  const { massMjup, semiMajorAxisAu } = grid;
  const isMassBeyond =
    definition.form === 'mass-ratio' ||
    definition.massMinMjup < massMjup[0] ||
    definition.massMaxMjup > massMjup[massMjup.length - 1];
  return (
    isMassBeyond ||
    definition.semiMajorAxisMinAu < semiMajorAxisAu[0] ||
    definition.semiMajorAxisMaxAu > semiMajorAxisAu[semiMajorAxisAu.length - 1]
  );
}
