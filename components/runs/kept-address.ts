/** Before the sets of stars in the part of the address behind "#", which no server sees. */
const KEY = 'without=';

/**
 * Sets of a run's stars as text for an address: a bit a star in the run's order, six to a sign.
 *
 * @param stars names in the run's order
 */
export function keptToHash(
  run: number,
  stars: readonly string[],
  kept: readonly ReadonlySet<string>[],
): string {
  if (kept.length === 0) return '';
  const sets = kept.map((names) => toText(stars.map((name) => names.has(name))));
  return `#${KEY}${[run, ...sets].join('~')}`;
}

/** The sets that an address holds of this run; of another run, or damaged, none. */
export function keptFromHash(
  run: number,
  stars: readonly string[],
  hash: string,
): ReadonlySet<string>[] {
  if (!isKeptHash(hash)) return [];
  const [of, ...sets] = hash.slice(1 + KEY.length).split('~');
  if (of !== String(run)) return [];
  return sets.flatMap((text) => {
    const bits = fromText(text);
    if (bits === null || bits.length < stars.length || bits.lastIndexOf(true) >= stars.length) {
      return [];
    }
    const names = stars.filter((_, i) => bits[i]);
    return names.length > 0 && names.length < stars.length ? [new Set(names)] : [];
  });
}

const isKeptHash = (hash: string): boolean => hash.startsWith(`#${KEY}`);

const SIGNS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';
const PER_SIGN = 6;

function toText(bits: readonly boolean[]): string {
  let text = '';
  for (let from = 0; from < bits.length; from += PER_SIGN) {
    let sign = 0;
    for (let i = 0; i < PER_SIGN; i++) if (bits[from + i]) sign |= 1 << i;
    text += SIGNS[sign];
  }
  return text;
}

function fromText(text: string): boolean[] | null {
  const signs = [...text].map((sign) => SIGNS.indexOf(sign));
  if (signs.includes(-1)) return null;
  return signs.flatMap((sign) =>
    Array.from({ length: PER_SIGN }, (_, i) => (sign & (1 << i)) !== 0),
  );
}
