import type { WrittenMaps } from './written-maps';

const axis = (unit: string, values: readonly number[]) => ({ unit, values });

/** One map as JSON: target, axes with their units, and a row of completeness for each mass. */
export async function jsonOfMap(maps: WrittenMaps): Promise<string> {
  const { massMjup, semiMajorAxisAu, targets, provenance, title } = maps;
  const columns = semiMajorAxisAu.length;
  let values: number[] = [];
  for await (const map of maps.maps()) values = Array.from(map);
  const completeness = massMjup.map((_, i) => values.slice(i * columns, (i + 1) * columns));
  const content = {
    ...(targets === null ? {} : { target: targets[0] }),
    mass: axis('Mjup', massMjup),
    semi_major_axis: axis('AU', semiMajorAxisAu),
    completeness,
    title,
    provenance: Object.fromEntries(provenance),
  };
  return `${JSON.stringify(content)}\n`;
}
