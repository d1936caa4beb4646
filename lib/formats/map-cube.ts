import { type ColumnUnit, ourUnit, readColumnUnit } from './column-units';
import type { MapRecord, ReadContext } from './kinds';
import { uploadLimits } from './limits';
import { axisRule, convertedFault, mapShapeFault } from './map-grid';
import { CompletenessValues } from './map-values';
import { findTargetNameProblem, TargetBook } from './names';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { Place } from './table';

/** An axis as its container gives it. */
export interface RawAxis {
  values: ArrayLike<number>;
  unit: string | null;
  /** Where the unit stands. */
  unitPlace: Place;
  place(index: number): Place;
}

/** Maps as a container of arrays gives them, before anything is judged. */
export interface MapCube {
  /** Shape [target, mass, semiMajorAxis]; NaN where the container says that nothing is known. */
  values: ArrayLike<number>;
  shape: [targets: number, masses: number, semiMajorAxes: number];
  mass: RawAxis | null;
  semiMajorAxis: RawAxis | null;
  targets: string[] | null;
  /** Where the shape is said, and where an element stands. */
  shapePlace: Place;
  targetsPlace: Place;
  place(target: number, mass: number, semiMajorAxis: number): Place;
  /** What the axes are called in this container, for "found no …". */
  axisWords: { mass: string; semiMajorAxis: string };
}

interface Axis {
  values: number[];
  isEdges: boolean;
}

const axes = {
  mass: { kind: 'companion mass', what: 'masses', name: 'mass' },
  semiMajorAxis: { kind: 'semi-major axis', what: 'semi-major axes', name: 'semi_major_axis' },
} as const satisfies Record<string, { kind: ColumnUnit; what: string; name: string }>;

/** Judges the maps of a container: axes, units, shape, names, values. */
class CubeReading {
  constructor(
    private readonly cube: MapCube,
    private readonly context: ReadContext,
    private readonly faults: FaultReport,
    private readonly notes: NoteReport,
  ) {}

  read(): MapRecord[] {
    const { cube, faults } = this;
    const [targets, rows, columns] = cube.shape;
    if (targets > uploadLimits.mapTargets) {
      const expected = `at most ${uploadLimits.mapTargets}`;
      faults.add({ ...cube.shapePlace, code: 'too-many', found: `${targets} maps`, expected });
      return [];
    }
    const shape = mapShapeFault(rows, columns);
    if (shape !== null) {
      faults.add({ ...cube.shapePlace, ...shape });
      return [];
    }
    if (this.refuseTransposed()) return [];
    const mass = this.readAxis('mass', rows);
    const semiMajorAxis = this.readAxis('semiMajorAxis', columns);
    const names = this.readTargets(targets);
    if (mass === null || semiMajorAxis === null || names === null || faults.count > 0) return [];
    if (mass.isEdges !== semiMajorAxis.isEdges) {
      faults.add({
        ...cube.shapePlace,
        code: 'axis-length',
        found: 'nodes along one axis and cell edges along the other',
        expected: 'the same along both',
      });
      return [];
    }
    const maps = this.readValues(names);
    if (faults.count > 0) return [];
    return names.map((target, i) => ({
      target,
      massMjup: mass.values,
      semiMajorAxisAu: semiMajorAxis.values,
      completeness: maps[i],
      nodeKind: mass.isEdges ? 'cells' : 'nodes',
    }));
  }

  private refuseTransposed(): boolean {
    const { cube } = this;
    const [, rows, columns] = cube.shape;
    const masses = cube.mass?.values.length;
    const others = cube.semiMajorAxis?.values.length;
    if (rows === columns || masses !== columns || others !== rows) return false;
    this.faults.add({
      ...cube.shapePlace,
      code: 'map-shape',
      found: `${rows} x ${columns} with ${masses} masses and ${others} semi-major axes: the map is transposed`,
      expected: 'semi-major axis along the fastest axis',
    });
    return true;
  }

  private readAxis(which: keyof typeof axes, side: number): Axis | null {
    const raw = this.cube[which];
    const { kind, what, name } = axes[which];
    if (raw === null) {
      this.faults.add({
        code: 'axis-missing',
        found: `no ${this.cube.axisWords[which]}`,
        expected: `the ${what} of the map`,
      });
      return null;
    }
    const reading = readColumnUnit(kind, raw.unit);
    if ('code' in reading) {
      this.faults.add({ ...raw.unitPlace, ...reading });
      return null;
    }
    if (raw.unit === null) {
      this.notes.inform('unit-default', `No unit is given, so read: ${name} in ${reading.unit}`);
    }
    if (reading.toOurUnit !== null) {
      const message = `Converted: ${name} from ${reading.unit} to ${ourUnit(kind)}`;
      this.notes.inform('unit-converted', message, raw.unitPlace);
    }
    if (raw.values.length !== side && raw.values.length !== side + 1) {
      this.faults.add({
        ...raw.unitPlace,
        code: 'axis-length',
        found: `${raw.values.length} ${what} for ${side} along the map`,
        expected: `${side} nodes or ${side + 1} cell edges`,
      });
      return null;
    }
    const values = this.readAxisValues(raw, what, reading.unit, reading.toOurUnit);
    return values && { values, isEdges: raw.values.length === side + 1 };
  }

  private readAxisValues(
    raw: RawAxis,
    what: string,
    unit: string,
    convert: ((value: number) => number) | null,
  ): number[] | null {
    const { expected, hint } = axisRule(what, unit);
    const values: number[] = [];
    for (let i = 0; i < raw.values.length; i += 1) {
      const value = raw.values[i];
      const found = String(value);
      if (!Number.isFinite(value)) {
        this.faults.add({ ...raw.place(i), code: 'not-finite', found, expected });
      } else if (!(value > 0)) {
        this.faults.add({ ...raw.place(i), code: 'out-of-range', found, expected, hint });
      } else if (i > 0 && value <= raw.values[i - 1]) {
        this.faults.add({
          ...raw.place(i),
          code: 'axis-order',
          found: `${value} after ${raw.values[i - 1]}`,
          expected: `${what} that increase`,
        });
      } else {
        const converted = convert === null ? value : convert(value);
        const fault = convertedFault(converted, value, values.at(-1) ?? 0);
        if (fault === null) values.push(converted);
        else this.faults.add({ ...raw.place(i), ...fault });
      }
    }
    return values.length === raw.values.length ? values : null;
  }

  private readTargets(count: number): string[] | null {
    const { cube, context, faults } = this;
    const book = new TargetBook(context.targetNames);
    if (cube.targets === null) {
      const written = context.defaultTarget?.trim() ?? '';
      if (count === 1 && written !== '') return this.findTargets([written], book, {});
      const message =
        count === 1
          ? 'the map names no target; choose on the form the star it belongs to'
          : `the file holds ${count} maps and names no targets; expected their names beside them`;
      faults.add({ code: 'target-missing', message });
      return null;
    }
    if (cube.targets.length !== count) {
      const of = (n: number, word: string) => `${n} ${word}${n === 1 ? '' : 's'}`;
      faults.add({
        ...cube.targetsPlace,
        code: 'axis-length',
        found: `${of(cube.targets.length, 'target')} for ${of(count, 'map')}`,
        expected: String(count),
      });
      return null;
    }
    return this.findTargets(cube.targets, book, cube.targetsPlace);
  }

  private findTargets(written: string[], book: TargetBook, place: Place): string[] | null {
    const seen = new Set<string>();
    const names = written.map((text, i) => {
      const trimmed = text.trim();
      const problem = findTargetNameProblem(trimmed);
      const where = written.length > 1 ? { ...place, row: i + 1 } : place;
      if (problem !== null) {
        this.faults.add({ ...where, ...problem });
        return '';
      }
      const target = book.find(trimmed);
      if (target === null) {
        const message = `${quoteFound(trimmed)} is not a target of this survey`;
        this.faults.add({ ...where, code: 'target-unknown', message });
        return '';
      }
      if (seen.has(target)) {
        const message = `${quoteFound(trimmed)} has two maps; expected one of each star`;
        this.faults.add({ ...where, code: 'target-repeat', message });
      }
      seen.add(target);
      return target;
    });
    return this.faults.count > 0 ? null : names;
  }

  private readValues(names: string[]): number[][] {
    const { cube } = this;
    const isZero = this.context.notMeasuredIsZero ?? false;
    const reader = new CompletenessValues(this.faults, this.notes, isZero);
    const [, rows, columns] = cube.shape;
    let at = 0;
    const maps = names.map((_, target) => {
      const completeness = new Array<number>(rows * columns);
      for (let i = 0; i < completeness.length; i += 1, at += 1) {
        const where = () => cube.place(target, Math.floor(i / columns), i % columns);
        completeness[i] = reader.takeTyped(cube.values[at], where);
      }
      return completeness;
    });
    reader.finish();
    return maps;
  }
}

/** Maps of a container of arrays as records; what is wrong goes to `faults`. */
export function readMapCube(
  cube: MapCube,
  context: ReadContext,
  faults: FaultReport,
  notes: NoteReport,
): MapRecord[] {
  return new CubeReading(cube, context, faults, notes).read();
}
