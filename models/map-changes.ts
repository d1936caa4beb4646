import { formatPlain } from '@/lib/quantities/display';
import type { MapReason } from '@/lib/schemas/map-states';
import { canonicalJson } from './digest';
import type { mapInputs } from './map-recipe';

type MapInputs = ReturnType<typeof mapInputs>;
type Stored = Record<string, unknown>;

export interface MapChange {
  reason: MapReason;
  /** A sentence without its full stop. */
  words: string;
}

const isEqual = (a: unknown, b: unknown) => canonicalJson(a ?? null) === canonicalJson(b ?? null);
const asRecord = (value: unknown): Stored =>
  typeof value === 'object' && value !== null ? (value as Stored) : {};

function quantityWords(value: unknown, [middle, low, high]: string[], unit: string): string {
  const held = asRecord(value);
  const text = (name: string) =>
    typeof held[name] === 'number' ? formatPlain(held[name] as number, 6) : null;
  const [lower, upper] = [text(low), high === undefined ? null : text(high)];
  const error = lower === null ? '' : upper === null ? ` ± ${lower}` : ` (${lower} to ${upper})`;
  return `${text(middle) ?? 'not known'}${error} ${unit}`;
}

function ageWords(value: unknown): string {
  const bounds = asRecord(value);
  const law = 'lowerMyr' in bounds ? ['lowerMyr', 'upperMyr'] : ['minMyr', 'maxMyr'];
  return quantityWords(value, ['medianMyr', ...law], 'Myr');
}

function distanceWords(value: unknown): string {
  return 'parallaxMas' in asRecord(value)
    ? quantityWords(value, ['parallaxMas', 'errorMas'], 'mas')
    : quantityWords(value, ['distancePc', 'errorPc'], 'pc');
}

const settingNames: Record<string, string> = {
  eccentricity: 'eccentricity',
  threshold: 'threshold',
  massOutsideTable: 'masses outside the cooling table',
  ageOutsideTable: 'ages outside the cooling table',
  ageNodesPerSide: 'nodes of the age',
  smallSample: 'few resolution elements near the star',
  unstableZone: 'zone that a stellar companion makes unstable',
  candidates: 'curves cut at candidates',
  fieldAge: 'age of stars outside their group',
};

function settingWords(stored: unknown, now: unknown): string {
  const [before, after] = [asRecord(stored), asRecord(now)];
  const names = [...new Set([...Object.keys(before), ...Object.keys(after)])];
  const changed = names.filter((name) => !isEqual(before[name], after[name]));
  return `map settings have changed: ${changed.map((name) => settingNames[name] ?? name).join(', ')}`;
}

/**
 * The first part in which a stored map's inputs differ from what they would be now, in the order in
 * which people ask; null where nothing differs.
 *
 * @param coolingName name of the cooling relation that the survey uses now
 */
export function findMapChange(
  stored: Stored,
  now: MapInputs,
  coolingName: string,
): MapChange | null {
  if (stored.kind !== now.kind) {
    const words = 'an uploaded map is in use; its curves would give another';
    return { reason: 'uploaded', words };
  }
  const parts: [MapReason, keyof MapInputs, () => string][] = [
    ['curve', 'curves', () => 'its contrast curves have changed'],
    ['age', 'age', () => `its age was ${ageWords(stored.age)} and is ${ageWords(now.age)}`],
    [
      'distance',
      'distance',
      () =>
        `its distance was ${distanceWords(stored.distance)} and is ${distanceWords(now.distance)}`,
    ],
    ['magnitude', 'hostMags', () => 'the magnitude of the star has changed'],
    ['membership', 'membershipProbability', () => 'its membership probability has changed'],
    ['stellar-companion', 'stellarCompanion', () => 'its stellar companion has changed'],
    ['candidates', 'candidates', () => 'its candidates without an answer have changed'],
    [
      'cooling',
      'cooling',
      () => `cooling was ${stored.coolingName ?? 'another relation'} and is ${coolingName}`,
    ],
    ['settings', 'settings', () => settingWords(stored.settings, now.settings)],
    ['grid', 'grid', () => 'the grid of masses and semi-major axes has changed'],
    [
      'engine',
      'engineVersion',
      () => `the engine was version ${stored.engineVersion} and is ${now.engineVersion}`,
    ],
  ];
  for (const [reason, name, words] of parts) {
    if (!isEqual(stored[name], now[name])) return { reason, words: words() };
  }
  return null;
}
