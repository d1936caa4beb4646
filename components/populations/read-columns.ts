import type { TabulatedShape } from '@/lib/population';

/** As many places as a stored definition may hold. */
const MOST = 500;

export type ReadColumns = { shape: TabulatedShape } | { fault: string };

/**
 * Two columns of numbers, a place and a density a line, as a person pastes them.
 *
 * @param text columns parted by blanks, tabs, commas or semicolons; lines after # are remarks, and
 *   a first line without numbers is taken for headings
 * @returns the shape, or what is wrong with which line
 */
export function readColumns(text: string): ReadColumns {
  const at: number[] = [];
  const perLog: number[] = [];
  const lines = text.split(/\r?\n/);
  for (const [index, raw] of lines.entries()) {
    const line = raw.replace(/#.*$/, '').trim();
    if (line === '') continue;
    const cells = line.split(/[\s,;]+/).filter((cell) => cell !== '');
    const [place, density] = cells.map((cell) => Number(cell.replace('−', '-')));
    if (at.length === 0 && cells.every((cell) => !Number.isFinite(Number(cell)))) continue;
    const where = `Line ${index + 1}`;
    if (cells.length !== 2 || !Number.isFinite(place) || !Number.isFinite(density)) {
      return { fault: `${where}: found “${line}”, expected two numbers.` };
    }
    if (!(place > 0)) return { fault: `${where}: the place ${place} must be above 0.` };
    if (density < 0) return { fault: `${where}: the density ${density} must not be below 0.` };
    const last = at[at.length - 1];
    if (last !== undefined && place <= last) {
      return { fault: `${where}: the place ${place} must be above the one before it, ${last}.` };
    }
    at.push(place);
    perLog.push(density);
  }
  if (at.length < 2) return { fault: 'At least two lines are needed: a place and a density each.' };
  if (at.length > MOST) return { fault: `${at.length} lines; at most ${MOST} are kept.` };
  if (!perLog.some((density) => density > 0)) return { fault: 'Every density is 0.' };
  return { shape: { shape: 'tabulated', at, perLog } };
}

export function writeColumns({ at, perLog }: TabulatedShape): string {
  return at.map((place, i) => `${place}\t${perLog[i]}`).join('\n');
}
