import { NotFound } from '@/lib/errors';
import { writeCsv } from '@/lib/formats';
import { type UploadKindName, uploadKindSchema } from '@/lib/schemas/uploads';

type Cell = string | number | null;

function table(headings: string[], rows: Cell[][]): string {
  return writeCsv(headings.map((name, i) => ({ name, values: rows.map((row) => row[i]) })));
}

/** Three invented stars; every example names them, so that the files fit each other. */
const stars = [
  { name: 'Example 1', ra: 10.5, dec: -20.25, parallax: 25.1, age: 120, mass: 1.05, k: 6.1 },
  { name: 'Example 2', ra: 84.2, dec: -51.07, parallax: 20.4, age: 24, mass: 1.4, k: 5.3 },
  { name: 'Example 3', ra: 187.71, dec: 12.39, parallax: 40.3, age: 45, mass: 0.72, k: 7.2 },
];

const separations = [0.1, 0.15, 0.25, 0.4, 0.7, 1.2, 2, 3];
const contrastAt = (separation: number, depth: number) =>
  Number((depth - 7.5 * Math.exp(-separation / 0.32)).toFixed(2));

const masses = [1, 2, 5, 10, 20];
const axes = [5, 10, 30, 100, 300];
/** Rises with mass, and between 10 and 100 AU; invented. */
const completenessAt = (mass: number, axis: number) =>
  Number(((mass / (mass + 4)) * Math.exp(-(Math.log(axis / 50) ** 2) / 2)).toFixed(4));

const ages = [5, 10, 20, 50, 100, 200, 500];
/** Brighter when heavier, fainter when older; invented. */
const magnitudeAt = (mass: number, age: number) =>
  Number((14.8 - 5 * Math.log10(mass / 5) + 3 * Math.log10(age / 20)).toFixed(3));

const examples: Record<UploadKindName, () => string> = {
  targets: () =>
    table(
      [
        'name',
        'ra [deg]',
        'dec [deg]',
        'parallax [mas]',
        'parallax_error [mas]',
        'age [Myr]',
        'age_error [Myr]',
        'mass [solMass]',
        'mag_K [mag]',
      ],
      stars.map(({ name, ra, dec, parallax, age, mass, k }) => [
        ...[name, ra, dec, parallax, 0.05, age, Math.round(age / 4), mass, k],
      ]),
    ),
  'contrast-curves': () =>
    table(
      ['target', 'separation [arcsec]', 'contrast [mag]', 'band', 'epoch'],
      stars.flatMap(({ name }, i) =>
        separations.map((separation) => [
          ...[name, separation, contrastAt(separation, 13 + 0.6 * i), 'K', `2024-0${i + 1}-15`],
        ]),
      ),
    ),
  'completeness-maps': () =>
    table(
      ['target', 'mass [Mjup]', 'semi_major_axis [AU]', 'completeness'],
      stars.flatMap(({ name }) =>
        masses.flatMap((mass) =>
          axes.map((axis) => [name, mass, axis, completenessAt(mass, axis)]),
        ),
      ),
    ),
  companions: () =>
    table(
      [
        'target',
        'companion',
        'status',
        'mass [Mjup]',
        'mass_error_lower',
        'mass_error_upper',
        'semi_major_axis [AU]',
        'semi_major_axis_error_lower',
        'semi_major_axis_error_upper',
      ],
      [
        ['Example 2', 'b', 'confirmed', 9, 2, 2, 44, 8, 12],
        ['Example 3', 'cc1', 'candidate', 6, 2, 3, 80, 20, 40],
      ],
    ),
  'cooling-tables': () =>
    table(
      ['age [Myr]', 'mass [Mjup]', 'mag_K [mag]'],
      ages.flatMap((age) => masses.map((mass) => [age, mass, magnitudeAt(mass, age)])),
    ),
  systems: () =>
    table(
      ['system', 'weight', 'mass [Mjup]', 'semi_major_axis [AU]'],
      [
        ['1', 1, 2, 6],
        ['1', 1, 0.6, 12],
        ['2', 2, 8, 40],
        ['3', 5, null, null],
      ],
    ),
};

/**
 * A small file of invented data that shows what a file of its kind holds.
 *
 * @throws NotFound for a kind that there is not
 */
export function exampleFile(kind: string): { fileName: string; text: string } {
  const known = uploadKindSchema.safeParse(kind);
  if (!known.success) throw new NotFound('example');
  return { fileName: `example-${known.data}.csv`, text: examples[known.data]() };
}
