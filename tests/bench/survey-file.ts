import type {
  AgeLaw,
  ContrastCurve,
  CoolingRelation,
  EccentricityLaw,
  MapGrid,
  SensitivitySettings,
  StarInputs,
} from '@/lib/sensitivity';

/** Stars with everything that their maps follow from; DEVELOPERS.md describes the file. */
export interface Survey {
  grid: MapGrid;
  settings: SensitivitySettings;
  cooling: CoolingRelation;
  stars: StarInputs[];
}

type Written = Record<string, unknown>;

function part(of: Written, name: string, where: string): Written {
  const value = of[name];
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new TypeError(`${where}.${name} must be an object`);
  }
  return value as Written;
}

function list(of: Written, name: string, where: string): unknown[] {
  const value = of[name];
  if (!Array.isArray(value)) throw new TypeError(`${where}.${name} must be a list`);
  return value;
}

function number(of: Written, name: string, where: string): number {
  const value = of[name];
  if (typeof value !== 'number') throw new TypeError(`${where}.${name} must be a number`);
  return value;
}

/** A list of numbers; null stands for a missing entry of a table. */
function numbers(of: Written, name: string, where: string): Float64Array {
  return Float64Array.from(list(of, name, where), (value) => {
    if (value === null) return Number.NaN;
    if (typeof value !== 'number') throw new TypeError(`${where}.${name} must hold numbers`);
    return value;
  });
}

function readCurve(value: unknown, where: string): ContrastCurve {
  const curve = value as Written;
  return {
    separationArcsec: numbers(curve, 'separationArcsec', where),
    contrastMag: numbers(curve, 'contrastMag', where),
    nSigma: number(curve, 'nSigma', where),
    band: String(curve.band),
    ...(curve.coverage !== undefined && { coverage: numbers(curve, 'coverage', where) }),
  };
}

function readStar(value: unknown, index: number): StarInputs {
  const star = value as Written;
  const where = `stars[${index}]`;
  const distance = part(star, 'distance', where);
  return {
    name: String(star.name ?? `Star ${index + 1}`),
    hostMag: number(star, 'hostMag', where),
    age: part(star, 'age', where) as unknown as AgeLaw,
    distance: {
      distancePc: number(distance, 'distancePc', `${where}.distance`),
      errorPc: number(distance, 'errorPc', `${where}.distance`),
    },
    curves: list(star, 'curves', where).map((curve, i) =>
      readCurve(curve, `${where}.curves[${i}]`),
    ),
  };
}

function readCooling(value: Written): CoolingRelation {
  if (value.cooling === 'built-in') return { kind: 'built-in' };
  const table = part(value, 'cooling', 'survey');
  const magnitudes = part(table, 'magnitudes', 'cooling');
  const bands = Object.keys(magnitudes);
  return {
    kind: 'table',
    table: {
      name: String(table.name ?? 'table of the survey file'),
      massMjup: numbers(table, 'massMjup', 'cooling'),
      ageMyr: numbers(table, 'ageMyr', 'cooling'),
      magnitudes: Object.fromEntries(
        bands.map((band) => [band, numbers(magnitudes, band, 'cooling.magnitudes')]),
      ),
    },
  };
}

/**
 * Reads a survey file; the values themselves are checked by the engine, star by star.
 *
 * @throws TypeError for a part that is missing or of another kind, named by its path
 */
export function readSurvey(text: string): Survey {
  const value = JSON.parse(text) as Written;
  const grid = part(value, 'grid', 'survey');
  const settings = part(value, 'settings', 'survey');
  return {
    grid: {
      massMjup: numbers(grid, 'massMjup', 'grid'),
      semiMajorAxisAu: numbers(grid, 'semiMajorAxisAu', 'grid'),
    },
    settings: {
      eccentricity: part(settings, 'eccentricity', 'settings') as EccentricityLaw,
      threshold: settings.threshold === 'hard' ? 'hard' : 'smooth',
      massOutsideTable: 'undetectable',
      ageOutsideTable: 'refuse',
    },
    cooling: readCooling(value),
    stars: list(value, 'stars', 'survey').map(readStar),
  };
}

/** The inverse of readSurvey. */
export function writeSurvey({ grid, settings, cooling, stars }: Survey): string {
  const { eccentricity, threshold } = settings;
  const relation = cooling.kind === 'built-in' ? 'built-in' : cooling.table;
  return JSON.stringify(
    { grid, settings: { eccentricity, threshold }, cooling: relation, stars },
    (_, value) =>
      value instanceof Float64Array
        ? Array.from(value, (x) => (Number.isFinite(x) ? x : null))
        : value,
  );
}
