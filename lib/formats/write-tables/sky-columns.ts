import type { ColumnDefinition } from './written-table';

type Rest = Omit<ColumnDefinition, 'name' | 'type' | 'description'>;
const text = (name: string, description: string, ucd?: string): ColumnDefinition => ({
  name,
  type: 'text',
  description,
  ...(ucd && { ucd }),
});
const number = (name: string, description: string, rest: Rest = {}): ColumnDefinition => ({
  name,
  type: 'number',
  description,
  ...rest,
});
const yesNo = (name: string, description: string): ColumnDefinition => ({
  name,
  type: 'boolean',
  description,
});

/** Columns of targets as files bring them, in the order in which they go out. */
export const targetDefinitions: readonly ColumnDefinition[] = [
  text('name', 'Star, as the survey lists it', 'meta.id;meta.main'),
  text('other_names', 'Other names, separated by ;', 'meta.id'),
  { name: 'gaia_dr3_id', type: 'identifier', description: 'Gaia DR3 source', ucd: 'meta.id' },
  number('ra', 'Right ascension, ICRS', { measures: 'angle', ucd: 'pos.eq.ra;meta.main' }),
  number('dec', 'Declination, ICRS', { measures: 'angle', ucd: 'pos.eq.dec;meta.main' }),
  number('ref_epoch', 'Epoch of the position, Julian year', { measures: 'Julian year' }),
  number('pmra', 'Proper motion in right ascension times cos(dec)', {
    measures: 'proper motion',
    ucd: 'pos.pm;pos.eq.ra',
  }),
  number('pmdec', 'Proper motion in declination', {
    measures: 'proper motion',
    ucd: 'pos.pm;pos.eq.dec',
  }),
  number('parallax', 'Parallax', { measures: 'parallax', ucd: 'pos.parallax.trig' }),
  number('parallax_error', 'Error of the parallax, 1 sigma', {
    measures: 'parallax',
    ucd: 'stat.error;pos.parallax.trig',
  }),
  number('distance', 'Distance', { measures: 'distance', ucd: 'pos.distance' }),
  number('distance_error', 'Error of the distance, 1 sigma', {
    measures: 'distance',
    ucd: 'stat.error;pos.distance',
  }),
  number('age', 'Age', { measures: 'age', ucd: 'time.age' }),
  number('age_error', 'Error of the age, 1 sigma', { measures: 'age', ucd: 'stat.error;time.age' }),
  number('age_error_lower', 'Error of the age towards younger, 1 sigma', {
    measures: 'age',
    ucd: 'stat.error;time.age',
  }),
  number('age_error_upper', 'Error of the age towards older, 1 sigma', {
    measures: 'age',
    ucd: 'stat.error;time.age',
  }),
  number('log_age_error', 'Error of log10(age) [dex], 1 sigma', {
    measures: 'log age error',
    ucd: 'stat.error;time.age',
  }),
  number('age_min', 'Youngest age', { measures: 'age', ucd: 'time.age;stat.min' }),
  number('age_max', 'Oldest age', { measures: 'age', ucd: 'time.age;stat.max' }),
  number('mass', 'Mass of the star', { measures: 'stellar mass', ucd: 'phys.mass' }),
  number('mass_error', 'Error of the mass, 1 sigma', {
    measures: 'stellar mass',
    ucd: 'stat.error;phys.mass',
  }),
  text('spectral_type', 'Spectral type', 'src.spType'),
  text('moving_group', 'Moving group'),
  number('membership_probability', 'Probability to belong to the moving group', {
    ucd: 'stat.probability',
  }),
  text('multiplicity', 'single, binary or multiple'),
  number('binary_semi_major_axis', 'Semi-major axis of the stellar companion', {
    measures: 'semi-major axis',
    ucd: 'phys.size.smajAxis',
  }),
  number('binary_eccentricity', 'Eccentricity of the stellar companion', {
    ucd: 'src.orbital.eccentricity',
  }),
  number('binary_mass_ratio', 'Mass of the stellar companion over that of the star'),
  yesNo('debris_disk', 'Whether a debris disk is known'),
  yesNo('selected_for_companion', 'Whether it was chosen because a companion was known'),
];

export const targetEndDefinitions: readonly ColumnDefinition[] = [
  text('notes', 'Notes', 'meta.note'),
  text('reference', 'Reference', 'meta.bib'),
];

/** Apparent magnitude in a band, and its error. */
export const bandDefinitions = (band: string): ColumnDefinition[] => [
  number(`mag_${band}`, `Apparent magnitude in ${band}`, {
    measures: 'magnitude',
    ucd: 'phot.mag',
  }),
  number(`mag_${band}_error`, `Error of the magnitude in ${band}, 1 sigma`, {
    measures: 'magnitude',
    ucd: 'stat.error;phot.mag',
  }),
];

export const surveyDefinition = text('survey', 'Survey that lists it', 'meta.id');

/** What became of a row in a run. */
export const useDefinitions: readonly ColumnDefinition[] = [
  yesNo('used', 'Whether it counts in the run'),
  text('reason', 'Why it does not, or how it does', 'meta.note'),
];

const massErrors = (name: string, words: string) =>
  number(name, `Error of the mass${words}, 1 sigma`, {
    measures: 'companion mass',
    ucd: 'stat.error;phys.mass',
  });
const axisErrors = (name: string, words: string) =>
  number(name, `Error of the semi-major axis${words}, 1 sigma`, {
    measures: 'semi-major axis',
    ucd: 'stat.error;phys.size.smajAxis',
  });

/** Columns of companions as files bring them. */
export const companionDefinitions: readonly ColumnDefinition[] = [
  text('target', 'Star, as the survey lists it', 'meta.id'),
  text('companion', 'Companion', 'meta.id;meta.main'),
  text('status', 'confirmed, candidate, ambiguous or background'),
  number('mass', 'Mass', { measures: 'companion mass', ucd: 'phys.mass' }),
  massErrors('mass_error', ''),
  massErrors('mass_error_lower', ' towards lighter'),
  massErrors('mass_error_upper', ' towards heavier'),
  number('semi_major_axis', 'Semi-major axis', {
    measures: 'semi-major axis',
    ucd: 'phys.size.smajAxis',
  }),
  axisErrors('semi_major_axis_error', ''),
  axisErrors('semi_major_axis_error_lower', ' inwards'),
  axisErrors('semi_major_axis_error_upper', ' outwards'),
  number('projected_separation', 'Projected separation', { measures: 'semi-major axis' }),
  number('separation', 'Separation from the star', {
    measures: 'separation',
    ucd: 'pos.angDistance',
  }),
  number('separation_error', 'Error of the separation, 1 sigma', {
    measures: 'separation',
    ucd: 'stat.error;pos.angDistance',
  }),
  number('position_angle', 'Position angle, east of north', {
    measures: 'angle',
    ucd: 'pos.posAng',
  }),
  number('position_angle_error', 'Error of the position angle, 1 sigma', {
    measures: 'angle',
    ucd: 'stat.error;pos.posAng',
  }),
  number('contrast', 'Magnitudes fainter than the star', {
    measures: 'contrast',
    ucd: 'phot.mag;arith.diff',
  }),
  number('contrast_error', 'Error of the contrast, 1 sigma', {
    measures: 'magnitude',
    ucd: 'stat.error;phot.mag',
  }),
  text('band', 'Band of the contrast'),
  text('epoch', 'Date of the observation'),
  number('eccentricity', 'Eccentricity', { ucd: 'src.orbital.eccentricity' }),
  text('common_proper_motion', 'yes, no or untested'),
  number('probability', 'Probability that it is bound', { ucd: 'stat.probability' }),
  text('reference', 'Reference', 'meta.bib'),
];

/** A star of the collaboration with what its surveys say, one row an entry. */
export const starDefinitions: readonly ColumnDefinition[] = [
  text('star', 'Star, each once across surveys', 'meta.id;meta.main'),
  surveyDefinition,
  text('name', 'Name in that survey', 'meta.id'),
  { name: 'gaia_dr3_id', type: 'identifier', description: 'Gaia DR3 source', ucd: 'meta.id' },
  number('ra', 'Right ascension, ICRS', { measures: 'angle', ucd: 'pos.eq.ra;meta.main' }),
  number('dec', 'Declination, ICRS', { measures: 'angle', ucd: 'pos.eq.dec;meta.main' }),
  number('distance', 'Distance in that survey', { measures: 'distance', ucd: 'pos.distance' }),
  number('age', 'Age in that survey', { measures: 'age', ucd: 'time.age' }),
  number('mass', 'Mass of the star in that survey', {
    measures: 'stellar mass',
    ucd: 'phys.mass',
  }),
  text('spectral_type', 'Spectral type', 'src.spType'),
  text('moving_group', 'Moving group'),
  number('adopted_distance', 'Distance that maps rest on', {
    measures: 'distance',
    ucd: 'pos.distance',
  }),
  text('adopted_distance_source', 'Where that distance comes from', 'meta.note'),
  number('adopted_age', 'Age that maps rest on', { measures: 'age', ucd: 'time.age' }),
  text('adopted_age_source', 'Where that age comes from', 'meta.note'),
  { name: 'epochs', type: 'integer', description: 'Epochs of observation', ucd: 'meta.number' },
  number(
    'probability',
    'Mean detection probability under the population of the lead analysis, else the newest shared one',
    {
      ucd: 'stat.probability',
    },
  ),
  text('left_out_reason', 'Why the entry is left out', 'meta.note'),
];
