import type { Track } from '@/components/charts/track-chart';
import type { CoolingRelationView } from '@/lib/schemas/cooling';
import { tableLookup } from '@/lib/sensitivity';

const MOST_TRACKS = 12;

/** At most twelve masses, evenly chosen, the ends among them. */
export function pickMasses(massMjup: readonly number[]): number[] {
  if (massMjup.length <= MOST_TRACKS) return [...massMjup];
  const places = Array.from({ length: MOST_TRACKS }, (_, i) =>
    Math.round((i * (massMjup.length - 1)) / (MOST_TRACKS - 1)),
  );
  return places.map((place) => massMjup[place]);
}

const asTable = ({ name, massMjup, ageMyr, magnitudes }: CoolingRelationView) => ({
  name,
  massMjup: Float64Array.from(massMjup),
  ageMyr: Float64Array.from(ageMyr),
  magnitudes: Object.fromEntries(
    Object.entries(magnitudes).map(([band, values]) => [
      band,
      Float64Array.from(values, (value) => value ?? Number.NaN),
    ]),
  ),
});

/** Magnitude against age at the relation's own nodes, one line a mass. */
export function tracksOf(relation: CoolingRelationView, band: string): Track[] {
  const { magnitude } = tableLookup(asTable(relation), band);
  return pickMasses(relation.massMjup).map((massMjup) => ({
    massMjup,
    values: Float64Array.from(relation.ageMyr, (age) => magnitude(massMjup, age)),
  }));
}

/** Bands that both relations have. */
export const sharedBands = (a: CoolingRelationView, b: CoolingRelationView) =>
  Object.keys(a.magnitudes).filter((band) => band in b.magnitudes);

/**
 * How many magnitudes fainter the second relation is than the first, at the first one's nodes. Where
 * one of the two does not reach there is no difference.
 */
export function differenceOf(
  first: CoolingRelationView,
  second: CoolingRelationView,
  band: string,
): Track[] {
  const here = tableLookup(asTable(first), band);
  const there = tableLookup(asTable(second), band);
  return pickMasses(first.massMjup)
    .map((massMjup) => ({
      massMjup,
      values: Float64Array.from(
        first.ageMyr,
        (age) => there.magnitude(massMjup, age) - here.magnitude(massMjup, age),
      ),
    }))
    .filter(({ values }) => values.some(Number.isFinite));
}
