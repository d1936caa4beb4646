import {
  isArray,
  isObject,
  JsonNumber,
  type JsonObject,
  type JsonValue,
  kindOf,
  memberOf,
} from './json-text';
import type { MapCube, RawAxis } from './map-cube';
import type { FaultReport } from './reports';

const numberOf = (value: JsonValue): number | null =>
  value instanceof JsonNumber ? Number(value.text) : value === null ? Number.NaN : null;

/** One map as an object: target, mass and semi_major_axis with unit and values, completeness. */
export function cubeOfJson(object: JsonObject, faults: FaultReport): MapCube | null {
  const completeness = memberOf(object, 'completeness');
  if (!isArray(completeness)) {
    const expected = 'a list of rows, one a mass';
    const found = kindOf(completeness);
    faults.add({ code: 'schema', item: '"completeness"', found, expected });
    return null;
  }
  const values: number[] = [];
  let columns = 0;
  completeness.items.forEach((row, i) => {
    const item = `"completeness", row ${i + 1}`;
    if (!isArray(row)) {
      faults.add({ code: 'schema', item, found: kindOf(row), expected: 'a list of numbers' });
      return;
    }
    if (i === 0) columns = row.items.length;
    if (row.items.length !== columns) {
      const found = `${row.items.length} values`;
      faults.add({ code: 'row-length', item, found, expected: `${columns}, as in row 1` });
    }
    row.items.forEach((cell, j) => {
      const value = numberOf(cell);
      if (value !== null) values.push(value);
      else {
        const place = `${item}, column ${j + 1}`;
        faults.add({
          code: 'not-a-number',
          item: place,
          found: kindOf(cell),
          expected: 'a number',
        });
      }
    });
  });
  const mass = axisOf(object, 'mass', faults);
  const semiMajorAxis = axisOf(object, 'semi_major_axis', faults);
  if (faults.count > 0) return null;
  const target = memberOf(object, 'target');
  return {
    values,
    shape: [1, completeness.items.length, columns],
    mass,
    semiMajorAxis,
    targets: typeof target === 'string' ? [target] : null,
    shapePlace: { item: '"completeness"' },
    targetsPlace: { item: '"target"' },
    place: (_, row, column) => ({ item: `"completeness", row ${row + 1}, column ${column + 1}` }),
    axisWords: { mass: 'key "mass"', semiMajorAxis: 'key "semi_major_axis"' },
  };
}

function axisOf(object: JsonObject, name: string, faults: FaultReport): RawAxis | null {
  const axis = memberOf(object, name);
  if (axis === undefined) return null;
  const list = isObject(axis) ? memberOf(axis, 'values') : axis;
  const unit = isObject(axis) ? memberOf(axis, 'unit') : undefined;
  const item = `"${name}"`;
  if (!isArray(list)) {
    const expected = 'an object with unit and values';
    faults.add({ code: 'schema', item, found: kindOf(axis), expected });
    return null;
  }
  const values = list.items.map((value) => numberOf(value) ?? Number.NaN);
  return {
    values,
    unit: typeof unit === 'string' ? unit : null,
    unitPlace: { item },
    place: (index) => ({ item: `${item}, value ${index + 1}` }),
  };
}
