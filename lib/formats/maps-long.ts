import type { ColumnSpec } from './columns';
import type { MapRecord, ReadContext } from './kinds';
import { uploadLimits } from './limits';
import { axisRule, mapShapeFault } from './map-grid';
import { CompletenessValues } from './map-values';
import type { Cell, TableReading } from './reading';
import { quoteFound } from './reports';
import { TargetColumn } from './target-column';

export const longMapColumns: readonly ColumnSpec[] = [
  { name: 'target' },
  { name: 'mass', required: true, unit: 'companion mass' },
  { name: 'semi_major_axis', required: true, unit: 'semi-major axis' },
  { name: 'completeness', required: true, unit: 'fraction' },
];

/** The rows of one target, in the order of the file. */
interface TargetPoints {
  target: string;
  rows: number[];
  masses: number[];
  axes: number[];
  values: number[];
}

/** Reads maps as one row per target, mass and semi-major axis: a full grid each, in any order. */
export function readLongMaps(reading: TableReading, context: ReadContext): MapRecord[] {
  const targets = new TargetColumn(reading, context);
  if (!targets.check()) return [];
  const completeness = reading.column('completeness');
  const values = new CompletenessValues(
    reading.faults,
    reading.notes,
    context.notMeasuredIsZero ?? false,
    completeness?.toOurUnit ?? null,
  );
  const massRule = axisRule('masses', 'Mjup');
  const semiMajorAxisRule = axisRule('semi-major axes', 'AU');
  const byTarget = new Map<string, TargetPoints>();
  const broken = new Set<Cell<string>>();
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const target = targets.read(row);
    const mass = reading.number('mass', row, massRule);
    const axis = reading.number('semi_major_axis', row, semiMajorAxisRule);
    const value = values.take(completeness?.raw.cells[row] ?? null, () =>
      reading.place(row, 'completeness'),
    );
    if (mass === null) reading.missing('mass', row, 'a mass in Mjup');
    if (axis === null) reading.missing('semi_major_axis', row, 'a semi-major axis in AU');
    if (typeof mass !== 'number' || typeof axis !== 'number' || typeof target !== 'string') {
      broken.add(target);
      continue;
    }
    addPoint(byTarget, target, row, mass, axis, value);
  }
  values.finish();
  refuseTooManyTargets(reading, byTarget.size);
  if (!reading.isComplete) return [];
  return [...byTarget.values()]
    .filter(({ target }) => !broken.has(target))
    .flatMap((points) => fillGrid(reading, points) ?? []);
}

function addPoint(
  byTarget: Map<string, TargetPoints>,
  target: string,
  row: number,
  mass: number,
  axis: number,
  value: number,
): void {
  let points = byTarget.get(target);
  if (points === undefined) {
    points = { target, rows: [], masses: [], axes: [], values: [] };
    byTarget.set(target, points);
  }
  points.rows.push(row);
  points.masses.push(mass);
  points.axes.push(axis);
  points.values.push(value);
}

function refuseTooManyTargets(reading: TableReading, count: number): void {
  if (count <= uploadLimits.mapTargets) return;
  reading.fault(
    {},
    {
      code: 'too-many',
      found: `the maps of ${count} targets`,
      expected: `at most ${uploadLimits.mapTargets}`,
    },
  );
}

function sortedDistinct(values: number[]): number[] {
  return [...new Set(values)].sort((a, b) => a - b);
}

function fillGrid(reading: TableReading, points: TargetPoints): MapRecord | null {
  const massMjup = sortedDistinct(points.masses);
  const semiMajorAxisAu = sortedDistinct(points.axes);
  const item = `target ${quoteFound(points.target)}`;
  const shape = mapShapeFault(massMjup.length, semiMajorAxisAu.length);
  if (shape !== null) {
    reading.fault({ item }, shape);
    return null;
  }
  const width = semiMajorAxisAu.length;
  const massIndex = new Map(massMjup.map((value, i) => [value, i]));
  const axisIndex = new Map(semiMajorAxisAu.map((value, j) => [value, j]));
  const firstRow = new Int32Array(massMjup.length * width).fill(-1);
  const completeness = new Array<number>(massMjup.length * width).fill(0);
  let filled = 0;
  for (let k = 0; k < points.rows.length; k += 1) {
    const [mass, axis] = [points.masses[k], points.axes[k]];
    const cell = (massIndex.get(mass) ?? 0) * width + (axisIndex.get(axis) ?? 0);
    if (firstRow[cell] >= 0) {
      reportRepeat(reading, points, k, firstRow[cell]);
      continue;
    }
    firstRow[cell] = points.rows[k];
    completeness[cell] = points.values[k];
    filled += 1;
  }
  if (filled < completeness.length) {
    const hole = firstRow.indexOf(-1);
    const point = `mass ${massMjup[Math.floor(hole / width)]}, semi-major axis ${semiMajorAxisAu[hole % width]}`;
    reading.fault(
      { item },
      {
        code: 'grid-hole',
        message: `found ${filled} of the ${completeness.length} grid points; the point ${point} is missing`,
      },
    );
    return null;
  }
  return { target: points.target, massMjup, semiMajorAxisAu, completeness, nodeKind: 'nodes' };
}

function reportRepeat(reading: TableReading, points: TargetPoints, k: number, first: number): void {
  const { line } = reading.place(first);
  const point = `mass ${points.masses[k]}, semi-major axis ${points.axes[k]}`;
  reading.fault(reading.place(points.rows[k]), {
    code: 'grid-repeat',
    message: `the point ${point} of ${quoteFound(points.target)} is already on line ${line ?? first + 1}`,
  });
}
