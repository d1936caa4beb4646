import { type ColumnUnit, ourUnit, readColumnUnit } from './column-units';
import { foldHeading, splitHeading } from './headings';
import type { ColumnReading, MapRecord, ReadContext } from './kinds';
import { axisRule, convertedFault, mapShapeFault } from './map-grid';
import { CompletenessValues } from './map-values';
import { findTargetNameProblem, TargetBook } from './names';
import { readNumberText } from './numbers';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { Place, RawCell, RawTable } from './table';

type Convert = ((value: number) => number) | null;

/** True where the headings after the first are numbers: semi-major axes and not column names. */
export function isWideMap(table: RawTable): boolean {
  const headings = table.columns.slice(1).map(({ heading }) => heading);
  const numeric = headings.filter((heading) => typeof readNumberText(heading, '') === 'number');
  return headings.length > 0 && numeric.length * 2 > headings.length;
}

/**
 * Reads one map whose first row holds the semi-major axes and first column the masses. The corner
 * may state units: `mass [Mjup]\semi_major_axis [AU]`.
 */
export class WideMapReading {
  readonly readings: ColumnReading[] = [];

  constructor(
    private readonly table: RawTable,
    private readonly context: ReadContext,
    private readonly faults: FaultReport,
    private readonly notes: NoteReport,
  ) {}

  read(): MapRecord[] {
    const isComplete = this.faults.count === 0;
    const target = this.readTarget();
    const corner = this.readCorner();
    if (corner === null) return [];
    const semiMajorAxisAu = this.readAxis(
      this.table.columns.slice(1).map(({ heading }) => heading),
      (index) => ({ ...this.table.headingPlace, item: `column ${index + 2}` }),
      'semi-major axes',
      'AU',
      corner.axis,
    );
    const massMjup = this.readAxis(
      this.table.columns[0].cells,
      (index) => ({ ...this.table.rowPlace(index), item: 'column 1' }),
      'masses',
      'Mjup',
      corner.mass,
    );
    const shape = mapShapeFault(this.table.rowCount, this.table.columns.length - 1);
    if (shape !== null && isComplete) this.faults.add(shape);
    const completeness = this.readValues();
    if (target === null || this.faults.count > 0) return [];
    return [{ target, massMjup, semiMajorAxisAu, completeness, nodeKind: 'nodes' }];
  }

  private readTarget(): string | null {
    const written = this.context.defaultTarget?.trim() ?? '';
    if (written === '') {
      this.faults.add({
        code: 'target-missing',
        message:
          'a map in rows and columns names no target; choose on the form the star it belongs to',
      });
      return null;
    }
    const problem = findTargetNameProblem(written);
    const target = new TargetBook(this.context.targetNames).find(written);
    if (problem !== null) this.faults.add(problem);
    else if (target === null) {
      const message = `${quoteFound(written)} is not a target of this survey`;
      this.faults.add({ code: 'target-unknown', message });
    }
    return target;
  }

  /** The units that the corner states; null where it says that the map is transposed. */
  private readCorner(): { mass: Convert; axis: Convert } | null {
    const corner = this.table.columns[0].heading;
    const parts = corner.split('\\').map(splitHeading);
    const names = parts.map(({ name }) => foldHeading(name));
    if (names.length === 2 && names[0] === 'semi_major_axis' && names[1] === 'mass') {
      this.faults.add({
        ...this.table.headingPlace,
        code: 'map-shape',
        found: 'semi-major axes down and masses across: the map is transposed',
        expected: 'masses in the first column and semi-major axes in the first row',
      });
      return null;
    }
    const unitOf = (name: string) => parts[names.indexOf(name)]?.unit ?? null;
    const mass = this.readUnit('companion mass', unitOf('mass'), 'mass');
    const axis = this.readUnit('semi-major axis', unitOf('semi_major_axis'), 'semi_major_axis');
    this.readings.push({ index: 1, heading: corner, readAs: 'mass', unit: mass.unit });
    this.table.columns.slice(1).forEach(({ heading }, i) => {
      this.readings.push({ index: i + 2, heading, readAs: 'completeness', unit: null });
    });
    return { mass: mass.convert, axis: axis.convert };
  }

  private readUnit(kind: ColumnUnit, text: string | null, what: string) {
    const reading = readColumnUnit(kind, text);
    if ('code' in reading) {
      this.faults.add({ ...this.table.headingPlace, item: 'column 1', ...reading });
      return { unit: null, convert: null };
    }
    const { unit, toOurUnit } = reading;
    if (text === null) {
      this.notes.inform(
        'unit-default',
        `No unit is given, so read: ${what} in ${unit}`,
        this.table.headingPlace,
      );
    }
    if (toOurUnit !== null) {
      this.notes.inform(
        'unit-converted',
        `Converted: ${what} from ${unit} to ${ourUnit(kind)}`,
        this.table.headingPlace,
      );
    }
    return { unit, convert: toOurUnit };
  }

  private readAxis(
    cells: RawCell[],
    where: (index: number) => Place,
    what: string,
    unit: string,
    convert: Convert,
  ): number[] {
    const { expected, hint } = axisRule(what, unit);
    const values: number[] = [];
    let last = 0;
    cells.forEach((cell, index) => {
      const reading = readNumberText(String(cell ?? ''), unit);
      if (reading === null) {
        this.faults.add({ ...where(index), code: 'value-missing', found: 'nothing', expected });
      } else if (typeof reading !== 'number') this.faults.add({ ...where(index), ...reading });
      else if (!(reading > 0)) {
        this.faults.add({
          ...where(index),
          code: 'out-of-range',
          found: String(reading),
          expected,
          hint,
        });
      } else if (reading <= last) {
        const found = `${reading} after ${last}`;
        this.faults.add({
          ...where(index),
          code: 'axis-order',
          found,
          expected: `${what} that increase`,
        });
      } else {
        last = reading;
        const value = convert === null ? reading : convert(reading);
        const fault = convertedFault(value, reading, values.at(-1) ?? 0);
        if (fault === null) values.push(value);
        else this.faults.add({ ...where(index), ...fault });
      }
    });
    return values;
  }

  /** Shape [mass, semiMajorAxis], row-major. */
  private readValues(): number[] {
    const isZero = this.context.notMeasuredIsZero ?? false;
    const values = new CompletenessValues(this.faults, this.notes, isZero);
    const completeness: number[] = [];
    const { columns, rowCount } = this.table;
    for (let row = 0; row < rowCount; row += 1) {
      for (let index = 1; index < columns.length; index += 1) {
        const where = () => ({ ...this.table.rowPlace(row), item: `column ${index + 1}` });
        completeness.push(values.take(columns[index].cells[row], where));
      }
    }
    values.finish();
    return completeness;
  }
}
