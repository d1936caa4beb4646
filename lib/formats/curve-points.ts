import type { CurveRecord } from './kinds';
import type { TableReading } from './reading';
import { quoteFound } from './reports';

/** One row of a curve file. */
export interface CurvePoint {
  row: number;
  target: string;
  band: string;
  epoch: string | null;
  nSigma: number;
  thresholdProbability: number;
  instrument: string | null;
  reference: string | null;
  separationArcsec: number;
  contrastMag: number;
  coverage: number | null;
}

const fewestPoints = 2;

/**
 * Makes one curve of the points of one star, epoch, band and instrument.
 *
 * Points out of order are sorted with a warning; the same point twice counts once; another
 * contrast at the same separation, or settings that change along the curve, are faults.
 *
 * @returns the curve, or null where it has a fault
 */
export function buildCurve(reading: TableReading, points: CurvePoint[]): CurveRecord | null {
  const [first] = points;
  const item = `target ${quoteFound(first.target)}`;
  const before = reading.faults.count;
  checkSettings(reading, points);
  const distinct = withoutRepeats(reading, points);
  if (reading.faults.count > before) return null;
  if (distinct.length < fewestPoints) {
    const found = distinct.length === 1 ? '1 point' : `${distinct.length} points`;
    const at = first.epoch === null ? '' : ` at epoch ${first.epoch}`;
    reading.fault(
      { item },
      { code: 'too-few', found: found + at, expected: `at least ${fewestPoints}` },
    );
    return null;
  }
  const isOrdered = distinct.every(
    (point, i) => i === 0 || point.separationArcsec > distinct[i - 1].separationArcsec,
  );
  if (!isOrdered) {
    reading.notes.warn('axis-order', 'Separations are not in order; they are sorted', { item });
  }
  const sorted = [...distinct].sort((a, b) => a.separationArcsec - b.separationArcsec);
  const hasCoverage = sorted.some((point) => point.coverage !== null);
  return {
    target: first.target,
    band: first.band,
    epoch: first.epoch,
    nSigma: first.nSigma,
    thresholdProbability: first.thresholdProbability,
    instrument: first.instrument,
    reference: first.reference,
    separationArcsec: sorted.map((point) => point.separationArcsec),
    contrastMag: sorted.map((point) => point.contrastMag),
    coverage: hasCoverage ? sorted.map((point) => point.coverage ?? 1) : null,
    firstLine: reading.place(first.row).line ?? first.row + 1,
  };
}

function checkSettings(reading: TableReading, points: CurvePoint[]): void {
  const [first] = points;
  const settings = [
    ['n_sigma', 'nSigma'],
    ['threshold_probability', 'thresholdProbability'],
    ['reference', 'reference'],
  ] as const;
  for (const [column, key] of settings) {
    const other = points.find((point) => point[key] !== first[key]);
    if (other === undefined) continue;
    reading.fault(reading.place(other.row, column), {
      code: 'inconsistent',
      found: `${other[key]} after ${first[key]} for the same star and epoch`,
      expected: 'one value along a curve',
    });
  }
}

function withoutRepeats(reading: TableReading, points: CurvePoint[]): CurvePoint[] {
  const bySeparation = new Map<number, CurvePoint>();
  for (const point of points) {
    const earlier = bySeparation.get(point.separationArcsec);
    if (earlier === undefined) {
      bySeparation.set(point.separationArcsec, point);
      continue;
    }
    const place = reading.place(earlier.row);
    const where = place.line === undefined ? `row ${earlier.row + 1}` : `line ${place.line}`;
    const what = `separation ${point.separationArcsec} arcsec of ${quoteFound(point.target)} is already on ${where}`;
    if (earlier.contrastMag === point.contrastMag && earlier.coverage === point.coverage) {
      reading.notes.inform('row-repeated', `The ${what}; it counts once`, reading.place(point.row));
    } else {
      const other = earlier.contrastMag === point.contrastMag ? 'coverage' : 'contrast';
      reading.fault(reading.place(point.row), {
        code: 'grid-repeat',
        message: `${what} with another ${other}`,
      });
    }
  }
  return [...bySeparation.values()];
}
