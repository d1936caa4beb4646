import { cubeOfArrays } from './map-arrays';
import type { MapCube } from './map-cube';
import { type NpyArray, parseNpy } from './npy';
import { type FaultReport, quoteFound } from './reports';
import { unzip } from './zip';

const wanted = ['completeness', 'mass', 'semi_major_axis', 'target'];
const nameOf = (entry: string) => entry.replace(/\.npy$/, '');

/** Reads maps from a NumPy archive with the arrays completeness, mass, semi_major_axis[, target]. */
export async function parseNpz(bytes: Uint8Array, faults: FaultReport): Promise<MapCube | null> {
  const entries = await unzip(bytes, (name) => wanted.includes(nameOf(name)), faults);
  if (entries === null) return null;
  const names = [...entries.keys()].map(nameOf);
  if (!names.includes('completeness')) {
    const found = names.length === 0 ? 'none of our arrays' : `the arrays ${names.join(', ')}`;
    faults.add({ code: 'array-missing', found, expected: 'completeness as well' });
    return null;
  }
  const placeOf = (name: string) => ({ item: `array ${quoteFound(name)}` });
  const array = (name: string, kind: 'numbers' | 'texts'): NpyArray | null => {
    const content = entries.get(`${name}.npy`);
    return content ? parseNpy(content, kind, faults, placeOf(name)) : null;
  };
  const completeness = array('completeness', 'numbers');
  const mass = array('mass', 'numbers');
  const semiMajorAxis = array('semi_major_axis', 'numbers');
  const target = array('target', 'texts');
  if (completeness === null || faults.count > 0) return null;
  const withoutUnit = (axis: NpyArray | null) => axis && { ...axis, unit: null };
  return cubeOfArrays(
    {
      completeness,
      mass: withoutUnit(mass),
      semiMajorAxis: withoutUnit(semiMajorAxis),
      target,
      placeOf,
    },
    faults,
  );
}
