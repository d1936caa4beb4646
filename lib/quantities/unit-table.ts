import {
  AU_PER_PARSEC,
  EARTH_MASSES_PER_JUPITER,
  JUPITER_MASSES_PER_SUN,
  LIGHT_YEAR_M,
  PARSEC,
} from './constants';

/** One unit of a kind, and how it relates to the unit in which the kind is stored. */
export interface UnitDefinition {
  readonly name: string;
  readonly spellings: readonly string[];
  /** Stored units in one of these; unused for a flux ratio. */
  readonly factor: number;
  /** A ratio of fluxes, which becomes a magnitude by its logarithm. */
  readonly isFluxRatio?: boolean;
}

/** What containers write: null where the container knows no such unit and the column stays bare. */
export interface WrittenUnit {
  readonly ecsv: string | null;
  readonly votable: string | null;
  readonly machineReadableTable: string | null;
  readonly fits: string | null;
  readonly hdf5: string | null;
}

export interface UnitKindDefinition {
  /** The stored unit first. */
  readonly units: readonly UnitDefinition[];
  readonly written: WrittenUnit;
}

const unit = (name: string, factor: number, spellings: string[] = []): UnitDefinition => ({
  name,
  spellings,
  factor,
});

const everywhere = (name: string | null): WrittenUnit => ({
  ecsv: name,
  votable: name,
  machineReadableTable: name,
  fits: name,
  hdf5: name,
});

const ARCSEC_PER_DEGREE = 3600;
const MAS_PER_ARCSEC = 1000;

/** Angles in any of the three units, stored in the first. */
function angles(stored: 'deg' | 'mas' | 'arcsec'): UnitKindDefinition {
  const arcsec = { deg: ARCSEC_PER_DEGREE, mas: 1 / MAS_PER_ARCSEC, arcsec: 1 };
  const spellings = {
    deg: ['degree', 'degrees'],
    mas: ['milliarcsec', 'marcsec'],
    arcsec: ['arcseconds', 'arcsecond'],
  };
  const names = [stored, ...(['deg', 'mas', 'arcsec'] as const).filter((x) => x !== stored)];
  return {
    units: names.map((name) => unit(name, arcsec[name] / arcsec[stored], spellings[name])),
    written: everywhere(stored),
  };
}

/** Every kind of quantity that files and forms carry, with its units. */
export const UNIT_KINDS = {
  'companion mass': {
    units: [
      unit('Mjup', 1, ['jupiterMass', 'M_jup', 'jovMass', 'MJup']),
      unit('Mearth', 1 / EARTH_MASSES_PER_JUPITER, ['earthMass', 'M_earth']),
      unit('solMass', JUPITER_MASSES_PER_SUN, ['Msun', 'M_sun']),
    ],
    written: everywhere('Mjup'),
  },
  'stellar mass': {
    units: [unit('solMass', 1, ['Msun', 'M_sun'])],
    written: { ...everywhere('solMass'), machineReadableTable: 'Msun' },
  },
  'semi-major axis': { units: [unit('AU', 1, ['au'])], written: everywhere('AU') },
  distance: {
    units: [
      unit('pc', 1),
      unit('kpc', 1000),
      unit('lyr', LIGHT_YEAR_M / PARSEC.value),
      unit('AU', 1 / AU_PER_PARSEC, ['au']),
    ],
    written: everywhere('pc'),
  },
  angle: angles('deg'),
  parallax: angles('mas'),
  separation: angles('arcsec'),
  'proper motion': {
    units: [
      unit('mas/yr', 1, ['mas yr-1', 'mas yr^-1', 'mas.yr-1', 'mas.yr**-1']),
      unit('arcsec/yr', MAS_PER_ARCSEC, ['arcsec yr-1', 'arcsec yr^-1', 'arcsec.yr-1']),
    ],
    written: { ...everywhere('mas/yr'), fits: 'mas yr-1' },
  },
  age: {
    units: [unit('Myr', 1), unit('yr', 1e-6), unit('Gyr', 1000)],
    written: everywhere('Myr'),
  },
  magnitude: { units: [unit('mag', 1)], written: everywhere('mag') },
  contrast: {
    units: [unit('mag', 1), { name: '1', spellings: [], factor: 1, isFluxRatio: true }],
    written: everywhere('mag'),
  },
  fraction: { units: [unit('', 1), unit('%', 0.01, ['percent'])], written: everywhere(null) },
  'log age error': {
    units: [unit('dex', 1)],
    written: { ...everywhere(null), ecsv: 'dex', hdf5: 'dex' },
  },
} as const satisfies Record<string, UnitKindDefinition>;

export type UnitKind = keyof typeof UNIT_KINDS;
