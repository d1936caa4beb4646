import { formatAsymmetric, formatPlain } from '@/lib/quantities/display';
import type { AgeValue, DistanceValue, MatchEvidence, StarView } from '@/lib/schemas/stars';

/** A number and its errors do not part at the end of a line. */
const unbroken = (text: string) => text.replaceAll(' ', '\u00a0');

/** "45 +7 −5", "10–100"; "45 ± ?" where nobody gives an error. */
export function ageNumbers(age: AgeValue): string {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = age;
  const bounds =
    ageMinMyr === null || ageMaxMyr === null
      ? null
      : `${formatPlain(ageMinMyr, 3)}–${formatPlain(ageMaxMyr, 3)}`;
  if (ageMyr === null) return bounds ?? '?';
  if (ageLowerMyr !== null && ageUpperMyr !== null) {
    return unbroken(formatAsymmetric(ageMyr, ageMyr - ageLowerMyr, ageUpperMyr - ageMyr));
  }
  const middle = formatPlain(ageMyr, 3);
  return unbroken(bounds === null ? `${middle} ± ?` : `${middle} (${bounds})`);
}

/** "45 +7 −5 Myr". */
export const ageWords = (age: AgeValue) => `${ageNumbers(age)}\u00a0Myr`;

/** "25.3 ± 0.2", from a parallax where no distance is given. */
export function distanceNumbers(given: DistanceValue): string {
  const { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas } = given;
  if (distancePc !== null) return withError(distancePc, distanceErrorPc);
  if (parallaxMas === null) return '?';
  const distance = 1000 / parallaxMas;
  const share = parallaxErrorMas === null ? null : parallaxErrorMas / parallaxMas;
  return withError(distance, share === null ? null : distance * share);
}

/** "25.3 ± 0.2 pc". */
export const distanceWords = (given: DistanceValue) => `${distanceNumbers(given)}\u00a0pc`;

const withError = (value: number, error: number | null) =>
  error === null ? formatPlain(value) : unbroken(formatAsymmetric(value, error, error));

/** What speaks for two entries being one star. */
export function evidenceWords(evidence: MatchEvidence): string {
  if (evidence.by !== 'position') {
    return `both carry the ${evidence.by} ${evidence.found ?? ''}`.trim();
  }
  const { separationArcsec = 0, epochYr, motions, distanceRatio } = evidence;
  const motion =
    motions === 2
      ? 'after both proper motions'
      : motions === 1
        ? 'after the one proper motion that is known'
        : 'without proper motions';
  const distance =
    distanceRatio == null
      ? 'a distance is not known'
      : `distances differ by ${formatPlain(100 * (distanceRatio - 1), 2)}\u00a0%`;
  return `${separationArcsec.toFixed(2)}″ apart in ${formatPlain(epochYr ?? 2000, 6)} ${motion}; ${distance}`;
}

/** "3.6 σ apart". */
export function conflictWords(conflict: StarView['conflicts']['age']): string | null {
  if (conflict === null) return null;
  return conflict === 'differs' ? 'differ, no errors' : `${formatPlain(conflict, 2)}\u00a0σ apart`;
}
