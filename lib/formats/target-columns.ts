import type { ColumnSpec } from './columns';

/** The columns of a table of targets, in the order in which we write them. */
export const targetColumns: readonly ColumnSpec[] = [
  { name: 'name', required: true },
  { name: 'other_names' },
  { name: 'gaia_dr3_id', synonyms: ['source_id'] },
  { name: 'ra', unit: 'angle' },
  { name: 'dec', unit: 'angle' },
  { name: 'ref_epoch', unit: 'Julian year' },
  { name: 'pmra', unit: 'proper motion' },
  { name: 'pmdec', unit: 'proper motion' },
  { name: 'parallax', synonyms: ['plx'], unit: 'parallax' },
  { name: 'parallax_error', synonyms: ['plx_error'], unit: 'parallax', errorOf: 'parallax' },
  { name: 'distance', unit: 'distance' },
  { name: 'distance_error', unit: 'distance', errorOf: 'distance' },
  { name: 'age', unit: 'age' },
  { name: 'age_error', unit: 'age', errorOf: 'age' },
  { name: 'age_error_lower', unit: 'age', errorOf: 'age' },
  { name: 'age_error_upper', unit: 'age', errorOf: 'age' },
  { name: 'log_age_error', unit: 'log age error' },
  { name: 'age_min', unit: 'age', errorOf: 'age' },
  { name: 'age_max', unit: 'age', errorOf: 'age' },
  { name: 'mass', unit: 'stellar mass' },
  { name: 'mass_error', unit: 'stellar mass', errorOf: 'mass' },
  { name: 'spectral_type' },
  { name: 'moving_group' },
  { name: 'membership_probability', unit: 'fraction' },
  { name: 'multiplicity' },
  { name: 'binary_semi_major_axis', unit: 'semi-major axis' },
  { name: 'binary_eccentricity', unit: 'plain number' },
  { name: 'binary_mass_ratio', unit: 'plain number' },
  { name: 'debris_disk' },
  { name: 'selected_for_companion' },
  { name: 'notes' },
  { name: 'reference' },
];

/** Columns that mean something only together. */
export const targetPairs = [
  ['ra', 'dec'],
  ['age_error_lower', 'age_error_upper'],
  ['age_min', 'age_max'],
] as const;
