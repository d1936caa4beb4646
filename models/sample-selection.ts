import { type SampleDefinition, type SampleRange, spectralClasses } from '@/lib/schemas/samples';
import type { TargetRow } from './target';

/** What a selection asks of an entry: a star as one survey lists it. */
export type SampleEntry = Pick<
  TargetRow,
  | 'starId'
  | 'surveyId'
  | 'ageMyr'
  | 'ageMinMyr'
  | 'ageMaxMyr'
  | 'distancePc'
  | 'parallaxMas'
  | 'hostMassMsun'
  | 'spectralType'
  | 'movingGroup'
  | 'attributes'
>;

/** Facts of a star; each from the first of its entries that gives it. */
export interface StarFacts {
  surveyIds: string[];
  ageMyr: number | null;
  distancePc: number | null;
  hostMassMsun: number | null;
  spectralClass: (typeof spectralClasses)[number] | null;
  movingGroup: string | null;
  multiplicity: string | null;
}

export const OUTSIDE_SAMPLE = 'outside the sample';
export const KNOWN_COMPANION = 'chosen because a companion was known';

export const wasChosenForCompanion = ({ attributes }: Pick<SampleEntry, 'attributes'>) =>
  attributes.selectedForCompanion === true;

/** First letter of a spectral type, after marks of luminosity such as "d" and "sd". */
export function spectralClassOf(spectralType: string | null): StarFacts['spectralClass'] {
  const letter = /^[a-z]*([A-Z])/.exec(spectralType?.trim() ?? '')?.[1];
  return spectralClasses.find((one) => one === letter) ?? null;
}

function ageOf({ ageMyr, ageMinMyr, ageMaxMyr }: SampleEntry): number | null {
  if (ageMyr !== null && ageMyr !== undefined) return ageMyr;
  return ageMinMyr && ageMaxMyr ? Math.sqrt(ageMinMyr * ageMaxMyr) : null;
}

const distanceOf = ({ distancePc, parallaxMas }: SampleEntry): number | null =>
  distancePc ?? (parallaxMas ? 1000 / parallaxMas : null);

function multiplicityOf({ attributes }: SampleEntry): string | null {
  return typeof attributes.multiplicity === 'string' ? attributes.multiplicity : null;
}

/** The stars of entries by id. @param entries in the order of their surveys */
export function gatherStarFacts(entries: readonly SampleEntry[]): Map<string, StarFacts> {
  const stars = new Map<string, StarFacts>();
  for (const entry of entries) {
    const before = stars.get(entry.starId);
    stars.set(entry.starId, {
      surveyIds: [...(before?.surveyIds ?? []), entry.surveyId],
      ageMyr: before?.ageMyr ?? ageOf(entry),
      distancePc: before?.distancePc ?? distanceOf(entry),
      hostMassMsun: before?.hostMassMsun ?? entry.hostMassMsun ?? null,
      spectralClass: before?.spectralClass ?? spectralClassOf(entry.spectralType ?? null),
      movingGroup: before?.movingGroup ?? entry.movingGroup ?? null,
      multiplicity: before?.multiplicity ?? multiplicityOf(entry),
    });
  }
  return stars;
}

const isInRange = ({ min = 0, max = Number.POSITIVE_INFINITY }: SampleRange, value: number) =>
  value >= min && value <= max;
const fold = (name: string) => name.trim().toLowerCase();

/** The first part of a selection that a star does not meet; null for a star that meets all. */
export function findUnmet(star: StarFacts, definition: SampleDefinition): string | null {
  const { surveyIds, spectralType, movingGroups, multiplicity, unknown } = definition;
  if (surveyIds && !star.surveyIds.some((id) => surveyIds.includes(id))) return 'survey';
  const check = <T>(name: string, value: T | null, holds: (value: T) => boolean) => {
    if (value === null) return unknown === 'kept' ? null : `${name} not known`;
    return holds(value) ? null : name;
  };
  const place = (letter: (typeof spectralClasses)[number]) => spectralClasses.indexOf(letter);
  const { ageMyr, distancePc, hostMassMsun } = definition;
  return (
    (spectralType
      ? check('spectral type', star.spectralClass, (letter) =>
          isInRange({ min: place(spectralType.from), max: place(spectralType.to) }, place(letter)),
        )
      : null) ??
    (ageMyr ? check('age', star.ageMyr, (age) => isInRange(ageMyr, age)) : null) ??
    (distancePc ? check('distance', star.distancePc, (d) => isInRange(distancePc, d)) : null) ??
    (hostMassMsun ? check('mass', star.hostMassMsun, (m) => isInRange(hostMassMsun, m)) : null) ??
    (movingGroups
      ? check('moving group', star.movingGroup, (group) =>
          movingGroups.some((name) => fold(name) === fold(group)),
        )
      : null) ??
    (multiplicity
      ? check(
          'multiplicity',
          star.multiplicity,
          (is) => (is === 'single') === (multiplicity === 'single'),
        )
      : null)
  );
}

/**
 * Why each entry is out of a selection; those that are in have no reason.
 *
 * Facts are a star's, so a star is in or out as a whole. That a companion was known is a fact of an
 * entry: where another survey lists the star for other reasons, that one is a fair draw and stays.
 *
 * @param entries in the order of their surveys
 * @param definition null for all stars; those chosen for a known companion are out all the same
 */
export function findLeftOut<Entry extends SampleEntry>(
  entries: readonly Entry[],
  definition: SampleDefinition | null,
): Map<Entry, { reason: string; unmet: string }> {
  const reasons = new Map<Entry, { reason: string; unmet: string }>();
  const stars = definition ? gatherStarFacts(entries) : new Map<string, StarFacts>();
  for (const entry of entries) {
    const star = stars.get(entry.starId);
    const unmet = star && definition ? findUnmet(star, definition) : null;
    if (unmet !== null) reasons.set(entry, { reason: OUTSIDE_SAMPLE, unmet });
    else if (definition?.knownCompanion !== 'kept' && wasChosenForCompanion(entry)) {
      reasons.set(entry, { reason: KNOWN_COMPANION, unmet: KNOWN_COMPANION });
    }
  }
  return reasons;
}
