import type { Spread } from './rounds';

/** By name: RMS, max, mean (of a map under a population) or limit (relative). */
export type Errors = Record<string, number>;

export interface Target {
  /** What is held against it: the ratio, or the name of an error. */
  of: string;
  bound: 'at least' | 'at most';
  must: number;
}

export interface Line {
  name: string;
  stars: number;
  rounds: number;
  /** Null where nothing is timed. */
  medianMs: number | null;
  ratio: Spread;
  /** How the ratio is printed: `share` of a whole, `bytes` a number of kB, `times` a factor. */
  unit: 'times' | 'share' | 'bytes';
  yardstick: string;
  errors: Errors;
  targets: Target[];
}

function reached(line: Line, { of }: Target): number {
  const value = of === 'ratio' ? line.ratio.median : line.errors[of];
  if (value === undefined) throw new RangeError(`${line.name} has no ${of} to hold to its target`);
  return value;
}

export function isMet(line: Line, target: Target): boolean {
  const value = reached(line, target);
  return target.bound === 'at least' ? value >= target.must : value <= target.must;
}

/** Two digits, or all of a whole number. */
function shortly(value: number): string {
  return value >= 10 ? value.toFixed(0) : value.toPrecision(2);
}

function written(value: number, unit: Line['unit']): string {
  if (unit === 'share') return `${shortly(100 * value)} %`;
  if (unit === 'bytes') return `${(value / 1000).toFixed(value < 100_000 ? 1 : 0)} kB`;
  return `${shortly(value)}×`;
}

function writtenError(value: number): string {
  return value.toExponential(1).replace('e+0', '').replace('.0e', 'e');
}

function ratioCell({ ratio, unit }: Line): string {
  const median = written(ratio.median, unit);
  if (ratio.min === ratio.max) return median;
  return `${median} (${written(ratio.min, unit)} to ${written(ratio.max, unit)})`;
}

function targetCell(line: Line): string {
  return line.targets
    .map(({ of, bound, must }) => {
      const sign = bound === 'at least' ? '≥' : '≤';
      return of === 'ratio'
        ? `${sign} ${written(must, line.unit)}`
        : `${of} ${sign} ${writtenError(must)}`;
    })
    .join(', ');
}

function metCell(line: Line): string {
  if (line.targets.length === 0) return '–';
  const missed = line.targets.filter((target) => !isMet(line, target)).map(({ of }) => of);
  if (missed.length === 0) return 'met';
  return missed.length === line.targets.length ? 'not met' : `not met: ${missed.join(', ')}`;
}

function cellsOf(line: Line): string[] {
  const errors = Object.entries(line.errors).map(([of, value]) => `${of} ${writtenError(value)}`);
  return [
    line.name,
    String(line.stars),
    line.medianMs === null ? '–' : shortly(line.medianMs),
    ratioCell(line),
    line.yardstick,
    errors.join(', ') || '–',
    targetCell(line) || '–',
    metCell(line),
  ];
}

const HEADINGS = ['name', 'stars', 'median ms', 'ratio', 'yardstick', 'error', 'target', 'met'];

export function printTable(lines: Line[]): string {
  const rows = [HEADINGS, ...lines.map(cellsOf)];
  const widths = HEADINGS.map((_, column) => Math.max(...rows.map((row) => row[column].length)));
  return rows
    .map((row) =>
      row
        .map((cell, column) => cell.padEnd(widths[column]))
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

/** What is written for a reading program: every line, and whether each of its targets is met. */
export function linesWithVerdicts(lines: Line[]) {
  return lines.map((line) => ({
    ...line,
    targets: line.targets.map((target) => ({
      ...target,
      value: reached(line, target),
      met: isMet(line, target),
    })),
  }));
}
