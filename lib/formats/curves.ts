import { bandColumn } from './bands';
import type { ColumnSpec } from './columns';
import { buildCurve, type CurvePoint } from './curve-points';
import type { CurveRecord, ReadContext } from './kinds';
import { type Cell, positive, probability, refused, type TableReading } from './reading';
import { TargetColumn } from './target-column';

export const curveColumns: readonly ColumnSpec[] = [
  { name: 'target' },
  { name: 'separation', required: true, unit: 'separation' },
  { name: 'contrast', required: true, unit: 'contrast' },
  { name: 'band' },
  { name: 'epoch' },
  { name: 'n_sigma', unit: 'plain number' },
  { name: 'threshold_probability', unit: 'fraction' },
  { name: 'coverage', unit: 'fraction' },
  { name: 'instrument' },
  { name: 'reference' },
];

const defaultSigma = 5;
const defaultThresholdProbability = 0.5;

/** Reads a table of detection limits: one row per star, epoch and separation. */
export function readCurves(reading: TableReading, context: ReadContext): CurveRecord[] {
  const targets = new TargetColumn(reading, context);
  const hasTargets = targets.check();
  checkContrastUnit(reading);
  const band = bandColumn(reading, context);
  if (!hasTargets) return [];
  const groups = new Map<string, CurvePoint[]>();
  const broken = new Set<Cell<string>>();
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const point = readPoint(reading, row, targets, band);
    if (point === null) {
      broken.add(targets.read(row));
      continue;
    }
    const key = JSON.stringify([point.target, point.band, point.epoch, point.instrument]);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [point]);
    else group.push(point);
  }
  tellDefaults(reading);
  // The band is asked for last: where something else is wrong, the file is wrong, not incomplete.
  if (reading.faults.count === 0 && !band.isKnown) band.reportMissing();
  if (!reading.isComplete) return [];
  return [...groups.values()]
    .filter(([first]) => !broken.has(first.target))
    .flatMap((points) => buildCurve(reading, points) ?? []);
}

/** Magnitudes and flux ratios cannot be told apart by their values alone when all lie within 0 to 1. */
function checkContrastUnit(reading: TableReading): void {
  const column = reading.column('contrast');
  if (column === undefined || column.isUnitStated || reading.table.rowCount === 0) return;
  const values = column.raw.cells.map((cell) => Number(cell === '' ? Number.NaN : cell));
  const isUnclear =
    values.every((value) => !(value < 0 || value > 1)) && values.some((v) => v >= 0);
  if (!isUnclear) return;
  reading.fault(
    { ...reading.table.headingPlace, column: column.label },
    {
      code: 'unit-unclear',
      message: `values lie between 0 and 1 and no unit is given; write "${column.label} [mag]" or "${column.label} [1]" for a flux ratio`,
    },
  );
}

function readPoint(
  reading: TableReading,
  row: number,
  targets: TargetColumn,
  bands: ReturnType<typeof bandColumn>,
): CurvePoint | null {
  const target = targets.read(row);
  const separationArcsec = reading.number('separation', row, positive);
  const contrastMag = reading.number('contrast', row, { min: 0 });
  const band = bands.read(row);
  const epoch = reading.date('epoch', row);
  const nSigma = reading.number('n_sigma', row, positive);
  const threshold = reading.number('threshold_probability', row, probability);
  const coverage = reading.number('coverage', row, probability);
  const instrument = reading.text('instrument', row);
  const reference = reading.text('reference', row, 1000);
  if (separationArcsec === null) reading.missing('separation', row, 'a separation in arcsec');
  if (contrastMag === null) reading.missing('contrast', row, 'a contrast');
  if (target === refused || target === null || band === refused) return null;
  if (typeof separationArcsec !== 'number' || typeof contrastMag !== 'number') return null;
  return {
    row,
    target,
    band: band ?? '',
    epoch: epoch ?? null,
    nSigma: nSigma ?? defaultSigma,
    thresholdProbability: threshold ?? defaultThresholdProbability,
    instrument: instrument ?? null,
    reference: reference ?? null,
    separationArcsec,
    contrastMag,
    coverage: coverage ?? null,
  };
}

function tellDefaults(reading: TableReading): void {
  const defaults = [
    ['n_sigma', `n_sigma ${defaultSigma}`],
    ['threshold_probability', `threshold_probability ${defaultThresholdProbability}`],
    ['coverage', 'coverage 1 (all position angles)'],
  ] as const;
  const used = defaults.filter(([name]) => !reading.has(name)).map(([, text]) => text);
  if (used.length > 0 && reading.table.rowCount > 0) {
    const message = `Not given, so taken: ${used.join(', ')}`;
    reading.notes.inform('default-used', message, reading.table.headingPlace);
  }
}
