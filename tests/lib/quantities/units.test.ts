import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  convert,
  defaultUnit,
  parseUnit,
  UNIT_KINDS,
  type UnitKind,
  unitNames,
} from '@/lib/quantities/units';

const kinds = Object.keys(UNIT_KINDS) as UnitKind[];

describe('parseUnit(text, kind)', () => {
  test.each([
    ['M_jup', 'companion mass', 'Mjup'],
    ['jupiterMass', 'companion mass', 'Mjup'],
    ['jovMass', 'companion mass', 'Mjup'],
    ['MJup', 'companion mass', 'Mjup'],
    ['earthMass', 'companion mass', 'Mearth'],
    ['Msun', 'companion mass', 'solMass'],
    ['M_sun', 'stellar mass', 'solMass'],
    ['au', 'semi-major axis', 'AU'],
    ['lyr', 'distance', 'lyr'],
    ['arcsec', 'parallax', 'arcsec'],
    ['mas yr-1', 'proper motion', 'mas/yr'],
    ['Gyr', 'age', 'Gyr'],
    ['1', 'contrast', '1'],
    ['%', 'fraction', '%'],
    [' mag ', 'magnitude', 'mag'],
  ] as [string, UnitKind, string][])('reads %s of %s as %s', (text, kind, name) => {
    expect(parseUnit(text, kind)?.name).toBe(name);
  });

  test('knows no unit of another kind', () => {
    expect(parseUnit('pc', 'companion mass')).toBeNull();
    expect(parseUnit('Mjup', 'stellar mass')).toBeNull();
    expect(parseUnit('', 'age')).toBeNull();
  });

  test('reads every name and spelling back as the unit that has it', () => {
    for (const kind of kinds) {
      for (const unit of UNIT_KINDS[kind].units) {
        for (const text of [unit.name, ...unit.spellings]) {
          expect(parseUnit(text, kind)?.name).toBe(unit.name);
        }
      }
    }
  });
});

describe('convert(value, from, kind, to)', () => {
  test.each([
    [1, 'solMass', 'companion mass', undefined, 1047.56551466],
    [1, 'Mjup', 'companion mass', 'Mearth', 317.8284],
    [1, 'kpc', 'distance', undefined, 1000],
    [1, 'pc', 'distance', 'lyr', 3.26156377],
    [1, 'arcsec', 'parallax', undefined, 1000],
    [1, 'deg', 'separation', undefined, 3600],
    [2, 'Gyr', 'age', undefined, 2000],
    [1e-5, '1', 'contrast', undefined, 12.5],
    [12.5, 'mag', 'contrast', '1', 1e-5],
    [95, '%', 'fraction', undefined, 0.95],
  ] as [number, string, UnitKind, string | undefined, number][])(
    '%d %s of %s in %s is %d',
    (value, from, kind, to, expected) => {
      expect(convert(value, from, kind, to) / expected).toBeCloseTo(1, 6);
    },
  );

  test('there and back gives the same number for every pair of units', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...kinds),
        fc.double({ min: 0.001, max: 0.9, noNaN: true }),
        (kind, x) => {
          for (const from of unitNames(kind)) {
            for (const to of unitNames(kind)) {
              expect(convert(convert(x, from, kind, to), to, kind, from) / x).toBeCloseTo(1, 12);
            }
          }
        },
      ),
    );
  });

  test('refuses an unknown unit with the units that it knows', () => {
    expect(() => convert(1, 'stone', 'stellar mass')).toThrow(
      'unit of stellar mass must be one of solMass, got stone',
    );
  });

  test('refuses a flux ratio that is no contrast', () => {
    expect(() => convert(1, '1', 'contrast')).toThrow(RangeError);
    expect(() => convert(0, '1', 'contrast')).toThrow(RangeError);
  });
});

test('the stored unit of each kind is the one of the trade', () => {
  expect(kinds.map(defaultUnit)).toEqual([
    'Mjup',
    'solMass',
    'AU',
    'pc',
    'deg',
    'mas',
    'arcsec',
    'mas/yr',
    'Myr',
    'mag',
    'mag',
    '',
    'dex',
  ]);
});
