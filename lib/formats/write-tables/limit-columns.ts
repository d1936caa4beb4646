import type { ColumnDefinition } from './written-table';

/** The box that a limit or a population is about. */
const rangeColumns: readonly ColumnDefinition[] = [
  {
    name: 'mass_min',
    type: 'number',
    description: 'Lower edge in companion mass; missing where it differs from star to star',
    measures: 'companion mass',
    ucd: 'phys.mass;stat.min',
  },
  {
    name: 'mass_max',
    type: 'number',
    description: 'Upper edge in companion mass; missing where it differs from star to star',
    measures: 'companion mass',
    ucd: 'phys.mass;stat.max',
  },
  {
    name: 'semi_major_axis_min',
    type: 'number',
    description: 'Lower edge in semi-major axis',
    measures: 'semi-major axis',
    ucd: 'phys.size.smajAxis;stat.min',
  },
  {
    name: 'semi_major_axis_max',
    type: 'number',
    description: 'Upper edge in semi-major axis',
    measures: 'semi-major axis',
    ucd: 'phys.size.smajAxis;stat.max',
  },
];

/** One row per range, quantity, counting rule, interval and level: the first 21 in their fixed order. */
export const limitColumns: readonly ColumnDefinition[] = [
  { name: 'analysis', type: 'text', description: 'Analysis', ucd: 'meta.id' },
  { name: 'subset', type: 'text', description: 'Surveys whose stars were used' },
  {
    name: 'likelihood',
    type: 'text',
    description: 'mean-number: Poisson over all companions; host-fraction: one trial a star',
  },
  { name: 'population', type: 'text', description: 'Population of companions and its version' },
  { name: 'rate_prior', type: 'text', description: 'Prior of the quantity' },
  ...rangeColumns,
  {
    name: 'quantity',
    type: 'text',
    description:
      'host_fraction: share of stars with at least one companion; companions_per_star: mean number',
  },
  {
    name: 'interval',
    type: 'text',
    description: 'upper_limit, central (equal probability on each side) or highest_density',
  },
  {
    name: 'credible_level',
    type: 'number',
    description: 'Credible level as a fraction',
    ucd: 'stat.probability',
  },
  { name: 'lower', type: 'number', description: 'Lower end; missing for an upper limit' },
  {
    name: 'estimate',
    type: 'number',
    description: 'Posterior median; missing for the quantity that the run did not ask for',
    ucd: 'stat.value',
  },
  { name: 'upper', type: 'number', description: 'Upper end, or the upper limit' },
  {
    name: 'mcse',
    type: 'number',
    description: 'Monte Carlo standard error; missing where the number is an integral',
    ucd: 'stat.error',
  },
  { name: 'n_targets', type: 'integer', description: 'Stars, each once', ucd: 'meta.number' },
  {
    name: 'n_companions',
    type: 'integer',
    description: 'Companions that count; for a host fraction stars with one',
    ucd: 'meta.number',
  },
  {
    name: 'effective_targets',
    type: 'number',
    description: 'Exposure: sum over stars of the mean detection probability',
  },
  { name: 'run', type: 'integer', description: 'Run of the analysis', ucd: 'meta.id' },
  // Text where it is no number: a reader of CSV guesses the same.
  {
    name: 'engine_version',
    type: 'identifier',
    description: 'Version of the engine that made the maps',
  },
  { name: 'counting_rule', type: 'text', description: 'Which detections count' },
  { name: 'candidates', type: 'text', description: 'What became of candidates without an answer' },
  {
    name: 'background',
    type: 'number',
    description: 'Expected number of false detections among those counted',
  },
  {
    name: 'prior_cut_at',
    type: 'number',
    description: 'Where the prior of the quantity ends so that no star has a fraction above 1',
  },
  { name: 'combination', type: 'text', description: 'How a star in several surveys enters' },
  {
    name: 'credible_level_of_run',
    type: 'number',
    description: 'Level that the run was asked for',
    ucd: 'stat.probability',
  },
  { name: 'run_digest', type: 'text', description: 'SHA-256 of the result' },
  { name: 'state', type: 'text', description: 'draft, or the release that froze the run' },
];

/** The posterior of a run's rate on a grid. */
export const posteriorColumns: readonly ColumnDefinition[] = [
  { name: 'quantity', type: 'text', description: 'host_fraction or companions_per_star' },
  { name: 'value', type: 'number', description: 'Value of the quantity', ucd: 'stat.value' },
  {
    name: 'density',
    type: 'number',
    description: 'Posterior probability density per unit of the quantity',
  },
  {
    name: 'cumulative',
    type: 'number',
    description: 'Posterior probability that the quantity is at most this value',
    ucd: 'stat.probability',
  },
];

const levelOf = (name: string, words: string): ColumnDefinition => ({
  name,
  type: 'number',
  description: `Upper limit on the ${words}; missing where the prior is not defined`,
});

/** Upper limits side by side, one row a level. */
export const levelColumns: readonly ColumnDefinition[] = [
  {
    name: 'credible_level',
    type: 'number',
    description: 'Credible level as a fraction',
    ucd: 'stat.probability',
  },
  levelOf('host_fraction', 'share of stars with at least one companion'),
  levelOf('companions_per_star', 'mean number of companions per star'),
  levelOf('host_fraction_zero', 'share of stars, all detections set aside'),
  levelOf('companions_per_star_zero', 'mean number per star, all detections set aside'),
];

/** Populations that analyses rest on. */
export const populationColumns: readonly ColumnDefinition[] = [
  { name: 'population', type: 'text', description: 'Key of the population', ucd: 'meta.id' },
  { name: 'version', type: 'integer', description: 'Its version' },
  { name: 'name', type: 'text', description: 'Its name', ucd: 'meta.id' },
  { name: 'form', type: 'text', description: 'power-law, shaped, mass-ratio or systems' },
  {
    name: 'description',
    type: 'text',
    description: 'The laws in words; MJ is the mass of Jupiter',
    ucd: 'meta.note',
  },
  ...rangeColumns,
  { name: 'mass_ratio_min', type: 'number', description: 'Lower edge in companion over host mass' },
  { name: 'mass_ratio_max', type: 'number', description: 'Upper edge in companion over host mass' },
  {
    name: 'mass_index_log',
    type: 'number',
    description: 'Index of a power law in mass or mass ratio, per natural logarithm',
  },
  {
    name: 'mass_index_linear',
    type: 'number',
    description: 'The same index of dN/dM',
  },
  {
    name: 'semi_major_axis_index_log',
    type: 'number',
    description: 'Index of a power law in semi-major axis, per natural logarithm',
  },
  {
    name: 'semi_major_axis_index_linear',
    type: 'number',
    description: 'The same index of dN/da',
  },
  {
    name: 'host_mass_index',
    type: 'number',
    description: 'Index of the rate with host mass; missing where it does not scale',
  },
  {
    name: 'host_mass_reference',
    type: 'number',
    description: 'Host mass at which the rate is quoted',
    measures: 'stellar mass',
    ucd: 'phys.mass',
  },
  { name: 'digest', type: 'text', description: 'SHA-256 of the definition' },
];
