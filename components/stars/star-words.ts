import { formatPlain } from '@/lib/quantities/display';
import type { AgeValue, DistanceValue, MatchEvidence, StarView } from '@/lib/schemas/stars';

/** "45 (+7, −5) Myr", "10–100 Myr". */
export function ageWords(age: AgeValue): string {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = age;
  const plain = (value: number) => formatPlain(value, 3);
  if (ageMyr === null) return `${plain(ageMinMyr ?? 0)}–${plain(ageMaxMyr ?? 0)}\u00a0Myr`;
  if (ageLowerMyr === null || ageUpperMyr === null) return `${plain(ageMyr)}\u00a0Myr`;
  const [above, below] = [plain(ageUpperMyr - ageMyr), plain(ageMyr - ageLowerMyr)];
  const error = above === below ? `\u00a0±\u00a0${above}` : ` (+${above}, −${below})`;
  return `${plain(ageMyr)}${error}\u00a0Myr`;
}

/** "25.3 ± 0.2 pc", from a parallax where no distance is given. */
export function distanceWords(given: DistanceValue): string {
  const { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas } = given;
  if (distancePc !== null) {
    const error = distanceErrorPc === null ? '' : `\u00a0±\u00a0${formatPlain(distanceErrorPc, 2)}`;
    return `${formatPlain(distancePc)}${error}\u00a0pc`;
  }
  const parallax = parallaxMas ?? 0;
  const distance = 1000 / parallax;
  const error =
    parallaxErrorMas === null
      ? ''
      : `\u00a0±\u00a0${formatPlain((distance * parallaxErrorMas) / parallax, 2)}`;
  return `${formatPlain(distance)}${error}\u00a0pc`;
}

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
