import { formatPlain } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { CompanionView } from '@/lib/schemas/surveys';

/** Candidates that nobody settled, by where they lie. */
export interface OpenTally {
  inside: CompanionView[];
  outside: CompanionView[];
  /** Mass or semi-major axis unknown, or the ranges depend on the star's mass. */
  unplaced: CompanionView[];
}

function isSettled(group: CompanionView[]): boolean {
  return (
    group.some(({ status }) => status === 'confirmed') ||
    group.every(({ status }) => status === 'background')
  );
}

/**
 * Open candidates of several surveys, each once: the same name at the same target is one companion,
 * and one survey's confirmation settles it.
 */
export function tallyOpen(companions: CompanionView[], definition: ListedDefinition): OpenTally {
  const groups = new Map<string, CompanionView[]>();
  for (const companion of companions) {
    const key = `${companion.target} ${companion.name}`.toLowerCase();
    groups.set(key, [...(groups.get(key) ?? []), companion]);
  }
  const tally: OpenTally = { inside: [], outside: [], unplaced: [] };
  for (const group of groups.values()) {
    if (isSettled(group)) continue;
    const measured = group.find((one) => one.massMjup !== null && one.semiMajorAxisAu !== null);
    const probability = group.find((one) => one.probability !== null)?.probability ?? null;
    const candidate = { ...(measured ?? group[0]), probability };
    tally[placeOf(candidate, definition)].push(candidate);
  }
  return tally;
}

function placeOf(
  { massMjup, semiMajorAxisAu }: CompanionView,
  definition: ListedDefinition,
): keyof OpenTally {
  if (massMjup === null || semiMajorAxisAu === null || definition.form === 'mass-ratio') {
    return 'unplaced';
  }
  const isInside =
    massMjup >= definition.massMinMjup &&
    massMjup <= definition.massMaxMjup &&
    semiMajorAxisAu >= definition.semiMajorAxisMinAu &&
    semiMajorAxisAu <= definition.semiMajorAxisMaxAu;
  return isInside ? 'inside' : 'outside';
}

const nameOf = ({ target, name }: CompanionView) => `${target} ${name}`;

const countedAs = (count: number, words: string) =>
  `${count} ${count === 1 ? 'candidate' : 'candidates'} ${words}`;

/** "2 candidates without an answer in the ranges: Star 5 b (0.3), Star 6 b (0.8); 1 outside". */
export function tallyWords({ inside, outside, unplaced }: OpenTally): string {
  if (inside.length + outside.length + unplaced.length === 0) {
    return 'No candidate of these surveys is without an answer.';
  }
  const named = inside.map((one) =>
    one.probability === null ? nameOf(one) : `${nameOf(one)} (${formatPlain(one.probability)})`,
  );
  const parts = [
    `${countedAs(inside.length, 'without an answer in the ranges')}${named.length > 0 ? `: ${named.join(', ')}` : ''}`,
  ];
  if (outside.length > 0) parts.push(`${outside.length} outside`);
  if (unplaced.length > 0) parts.push(`${unplaced.length} of unknown place`);
  return `${parts.join('; ')}.`;
}

/** Candidates for which a run that counts candidates would stop. */
export function incomplete({ inside, unplaced }: OpenTally): string[] {
  const lost = unplaced.filter(
    ({ massMjup, semiMajorAxisAu, probability }) =>
      probability !== 0 && (massMjup === null || semiMajorAxisAu === null),
  );
  return [...inside.filter(({ probability }) => probability === null), ...lost].map(nameOf);
}
