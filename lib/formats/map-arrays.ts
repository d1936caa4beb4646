import type { MapCube, RawAxis } from './map-cube';
import type { NpyArray } from './npy';
import type { FaultReport } from './reports';
import type { Place } from './table';

/** The arrays of an archive or of an HDF5 file that make maps. */
export interface MapArrays {
  completeness: NpyArray;
  mass: (NpyArray & { unit: string | null }) | null;
  semiMajorAxis: (NpyArray & { unit: string | null }) | null;
  target: NpyArray | null;
  /** How an array is named in places: `array "mass"`, `/mass`. */
  placeOf(name: string): Place;
}

/** Arrays as maps: two dimensions are one map, three a cube of targets. */
export function cubeOfArrays(arrays: MapArrays, faults: FaultReport): MapCube | null {
  const { completeness, target, placeOf } = arrays;
  const { shape, numbers } = completeness;
  const shapePlace = placeOf('completeness');
  if (shape.length !== 2 && shape.length !== 3) {
    faults.add({
      ...shapePlace,
      code: 'map-shape',
      found: `${shape.length} dimension${shape.length === 1 ? '' : 's'}`,
      expected: '2, or 3 for a cube of targets',
    });
    return null;
  }
  const [targets, rows, columns] = shape.length === 2 ? [1, ...shape] : shape;
  return {
    values: numbers ?? [],
    shape: [targets, rows, columns],
    mass: axisOf(arrays.mass, 'mass', placeOf),
    semiMajorAxis: axisOf(arrays.semiMajorAxis, 'semi_major_axis', placeOf),
    targets: target?.texts ?? null,
    shapePlace,
    targetsPlace: placeOf('target'),
    place: (at, mass, axis) => ({
      item: [
        placeOf('completeness').item ?? 'value',
        `[${(shape.length === 2 ? [mass, axis] : [at, mass, axis]).join(', ')}]`,
      ].join(' '),
    }),
    axisWords: { mass: 'array mass', semiMajorAxis: 'array semi_major_axis' },
  };
}

function axisOf(
  array: MapArrays['mass'],
  name: string,
  placeOf: MapArrays['placeOf'],
): RawAxis | null {
  if (array === null || array.numbers === null) return null;
  const { item } = placeOf(name);
  return {
    values: array.numbers,
    unit: array.unit,
    unitPlace: { item },
    place: (index) => ({ item: `${item} [${index}]` }),
  };
}
