import { gzipSync } from 'node:zlib';
import { decodeMap, encodeMap } from '@/lib/sensitivity';
import type { Amount } from './amount';
import type { Errors, Line } from './report';
import { millisecondsOf, spreadOf } from './rounds';
import { GRID, mapSurvey } from './survey';

const SUMMED_MOST_BYTES = 8000;
/** What all maps of a sample took when they were coded as differences of neighbours. */
const ALL_MOST_BYTES: Readonly<Record<number, number>> = { 78: 200_000, 400: 1_160_000 };

const kilobytes = (bytes: number) => `${(bytes / 1000).toFixed(1)} kB`;

function bytesOf(values: Uint16Array): Buffer {
  const bytes = Buffer.alloc(2 * values.length);
  values.forEach((value, cell) => {
    bytes.writeUInt16LE(value, 2 * cell);
  });
  return bytes;
}

/** The plain bytes, as the route of a run's maps answers them, and the same through gzip. */
function linesOf(
  name: string,
  stars: number,
  values: Uint16Array,
  mostBytes: number | undefined,
  errors: Errors,
  { rounds }: Amount,
): Line[] {
  const plain = bytesOf(values);
  const zipped = gzipSync(plain).length;
  const zip = { run: () => gzipSync(plain).length };
  const times = Array.from({ length: rounds }, () => millisecondsOf(zip));
  const lineOf = (
    way: string,
    bytes: number,
    medianMs: number | null,
    yardstick: string,
  ): Line => ({
    name: `wire, ${name}, ${way}`,
    stars,
    rounds: medianMs === null ? 1 : rounds,
    medianMs,
    ratio: { median: bytes, min: bytes, max: bytes },
    unit: 'bytes',
    yardstick,
    errors,
    targets: mostBytes === undefined ? [] : [{ of: 'ratio', bound: 'at most', must: mostBytes }],
  });
  return [
    lineOf('uint16', plain.length, null, `float64, ${kilobytes(8 * values.length)}`),
    lineOf('gzip', zipped, spreadOf(times).median, `uint16, ${kilobytes(plain.length)}`),
  ];
}

/** Bytes of a mean map, which do not depend on the number of stars. */
function meanLines(stars: number, amount: Amount): Line[] {
  const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
  const mean = new Float64Array(size);
  decodeMap(mapSurvey(stars).maps).forEach((c, i) => {
    mean[i % size] += c / stars;
  });
  // A mean of ones may exceed 1 by rounding, which is no completeness.
  const stored = encodeMap(mean.map((c) => Math.min(1, c)));
  const max = decodeMap(stored).reduce((a, c, i) => Math.max(a, Math.abs(c - mean[i])), 0);
  return linesOf('mean map', stars, stored, SUMMED_MOST_BYTES, { max }, amount);
}

/** Bytes of the mean map and of all maps of a run. */
export function wireLines(amount: Amount): Line[] {
  const surveys = [5000, 400, 78, 12].map(mapSurvey).reverse();
  return [
    ...meanLines(400, amount),
    ...surveys.flatMap(({ stars, maps }) =>
      linesOf('all maps', stars, maps, ALL_MOST_BYTES[stars], {}, amount),
    ),
  ];
}
