import type { Entry } from './entries';

const MOST = 6;
const keyOf = (collaboration: string) => `rarebound-recent-${collaboration}`;

const isEntry = (value: unknown): value is Entry =>
  typeof value === 'object' &&
  value !== null &&
  ['id', 'group', 'title', 'note', 'href'].every(
    (key) => typeof (value as Record<string, unknown>)[key] === 'string',
  );

/** What was opened from the search in this browser, newest first; a browser may keep nothing. */
export function readRecent(collaboration: string): Entry[] {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(keyOf(collaboration)) ?? '[]');
    return Array.isArray(kept) ? kept.filter(isEntry).slice(0, MOST) : [];
  } catch {
    return [];
  }
}

export function keepRecent(collaboration: string, entry: Entry): void {
  const others = readRecent(collaboration).filter(({ id }) => id !== entry.id);
  try {
    localStorage.setItem(keyOf(collaboration), JSON.stringify([entry, ...others].slice(0, MOST)));
  } catch {
    // Storage may be full or forbidden: recent items are then those of this list alone.
  }
}
