import { quoteFound } from './reports';

/** Column names are equal without regard to case; space, `-` and `_` are one. */
export function foldHeading(text: string): string {
  return text
    .trim()
    .toLowerCase()
    .replace(/[\s_-]+/g, '_');
}

/** `mass [Mjup]` or `distance (pc)` as name and unit. */
export function splitHeading(heading: string): { name: string; unit: string | null } {
  const match = /^(.*?)\s*(?:\[([^\]]*)\]|\(([^)]*)\))$/s.exec(heading.trim());
  if (match === null || match[1] === '') return { name: heading.trim(), unit: null };
  const unit = (match[2] ?? match[3] ?? '').trim();
  return { name: match[1], unit: unit === '' ? null : unit };
}

/** `"ra", "dec" and 4 more`: the first headings, quoted. */
export function listHeadings(headings: string[], most = 6): string {
  const shown = headings.slice(0, most).map((heading) => quoteFound(heading));
  const rest = headings.length - most;
  return rest > 0 ? `${shown.join(', ')} and ${rest} more` : shown.join(', ');
}

/** Edits (insert, remove, replace, swap of neighbours) between two texts, or Infinity beyond 2. */
function editsWithinTwo(a: string, b: string): number {
  if (Math.abs(a.length - b.length) > 2) return Number.POSITIVE_INFINITY;
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const same = a[i - 1] === b[j - 1];
      row[j] = Math.min(last[j] + 1, row[j - 1] + 1, last[j - 1] + (same ? 0 : 1));
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) row[j] = Math.min(row[j], beforeLast[j - 2] + 1);
    }
    if (Math.min(...row) > 2) return Number.POSITIVE_INFINITY;
    beforeLast = last;
    last = row;
  }
  return last[b.length] <= 2 ? last[b.length] : Number.POSITIVE_INFINITY;
}

/**
 * The candidate within two edits of a word, the nearest first; null where none is near. Words of
 * up to three characters need an edit fewer than they have characters, or anything would match.
 */
export function nearestTo(word: string, candidates: Iterable<string>): string | null {
  const folded = foldHeading(word);
  let best: string | null = null;
  let fewest = Math.min(2, folded.length - 2);
  if (fewest < 1) return null;
  fewest += 1;
  for (const candidate of candidates) {
    const edits = editsWithinTwo(folded, foldHeading(candidate));
    if (edits < fewest) {
      best = candidate;
      fewest = edits;
    }
  }
  return best;
}
