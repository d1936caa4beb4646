import {
  describeLevel,
  describeSweepValue,
  quotedSweepValue,
  sweptParameters,
} from '@/lib/inference';
import {
  formatLimit,
  formatPercent,
  formatPlain,
  formatRate,
  type RateQuantity,
  THIN_SPACE,
} from '@/lib/quantities/display';
import type { ResultOf, StudyResult } from '@/lib/schemas/study-results';
import type { StudyKind, SystematicChange } from '@/lib/schemas/study-settings';
import { describeEccentricity } from './run-words';

const ruleNames = {
  'same-position': 'same position',
  deepest: 'deepest map',
  independent: 'independent epochs',
};

/** A change of one assumption, as its row is labelled. */
export function labelOf(
  change: SystematicChange,
  tables: readonly { id: string; name: string }[],
): string {
  switch (change.change) {
    case 'ages-young':
      return 'ages one sigma younger';
    case 'ages-old':
      return 'ages one sigma older';
    case 'distances-near':
      return 'distances one sigma nearer';
    case 'distances-far':
      return 'distances one sigma farther';
    case 'cooling': {
      const { coolingTableId } = change;
      if (coolingTableId === null) return 'built-in approximate cooling law';
      const table = tables.find(({ id }) => id === coolingTableId);
      return `cooling table ${table?.name ?? coolingTableId}`;
    }
    case 'threshold':
      return 'threshold hard for smooth, smooth for hard';
    case 'n-sigma-up':
      return 'threshold one sigma higher';
    case 'n-sigma-down':
      return 'threshold one sigma lower';
    case 'eccentricity':
      return describeEccentricity(change.law);
    case 'combination':
      return `shared stars: ${ruleNames[change.rule]}`;
  }
}

/** What a headline takes from the run that was asked. */
export interface HeadlinedRun {
  quantity: RateQuantity;
  /** [fraction]. */
  credibleLevel: number;
  /** The run's own limit. */
  limit: number;
}

type Headline<Kind extends StudyKind> = (result: ResultOf<Kind>, run: HeadlinedRun) => string;

const least = (values: readonly (number | null)[]) =>
  values.reduce<number>(
    (least, value) => (value !== null && value < least ? value : least),
    Number.POSITIVE_INFINITY,
  );
const times = (ratio: number) => `${ratio.toFixed(2)} times`;

/** "<5.8 % (95 %)": a limit is never without its level. */
const limitOf = (limit: number, { quantity, credibleLevel }: HeadlinedRun) =>
  `${formatLimit(limit, quantity)} (${describeLevel(credibleLevel)})`;

/** "<5.2 % to <7.5 % (95 %)". */
const limitsBetween = (limits: readonly number[], run: HeadlinedRun) =>
  `${formatLimit(Math.min(...limits), run.quantity)} to ${limitOf(Math.max(...limits), run)}`;

const ends = (values: readonly number[]) => [values[0], values[values.length - 1]];

/** "α −2 to 1", of indices stored per natural logarithm. */
const indexRange = (over: 'mass-index' | 'semi-major-axis-index', stored: readonly number[]) => {
  const quoted = ends(stored).map((value) => formatPlain(quotedSweepValue(over, value)));
  return `${over === 'mass-index' ? 'α' : 'β'} ${quoted.join(' to ')}`;
};

const headlines: { [Kind in StudyKind]: Headline<Kind> } = {
  'free-indices': ({ limit, limitFixed }, run) =>
    `${limitOf(limit, run)} with free indices, ${limitOf(limitFixed, run)} with fixed ones`,

  'limit-map': ({ limit, massMjup, semiMajorAxisAu }, run) => {
    const lowest = least(limit.flat());
    const row = limit.findIndex((values) => values.includes(lowest));
    const column = limit[row].indexOf(lowest);
    const mass = `${formatPlain(massMjup[row], 2)}${THIN_SPACE}MJ`;
    const axis = `${formatPlain(semiMajorAxisAu[column], 2)}${THIN_SPACE}AU`;
    return `${limitOf(lowest, run)} at best, for planets of ${mass} at ${axis} if none was found`;
  },

  sweep: ({ over, limit, value, plane }, run) => {
    if (plane) {
      const { massIndex, semiMajorAxisIndex } = plane;
      const alpha = indexRange('mass-index', massIndex);
      const beta = indexRange('semi-major-axis-index', semiMajorAxisIndex);
      const range = limitsBetween(plane.limit.flat(), run);
      return `From ${range} over ${alpha} and ${beta}, of dN/dM and dN/da`;
    }
    const { name, unit } = sweptParameters[over];
    const [first, last] = ends(limit).map((one) => limitOf(one, run));
    const [from, to] = ends(value).map((one) => describeSweepValue(over, one));
    const subject = unit === 'index' ? '' : `${name[0].toUpperCase()}${name.slice(1)}: `;
    return `${subject}${first} at ${from}, ${last} at ${to}`;
  },

  systematics: ({ rows, baseline }, run) => {
    const moved = rows
      .filter(({ ratio }) => ratio !== null)
      .sort(
        (a, b) =>
          Math.abs(Math.log(b.ratio as number)) - Math.abs(Math.log(a.ratio as number)) ||
          (a.label < b.label ? -1 : 1),
      );
    if (moved.length === 0) return `No change gave a limit beside ${limitOf(baseline, run)}`;
    const { label, ratio, limit } = moved[0];
    return `Of what the data rest on, most: ${label}, ${limitOf(limit as number, run)}, ${times(ratio as number)} the run’s ${formatLimit(baseline, run.quantity)}`;
  },

  'ages-cooling': ({ models, ageShifts }, run) => {
    const limits = models.flatMap(({ shifts }) => shifts.flatMap(({ limit }) => limit ?? []));
    if (limits.length === 0) return 'No age and no cooling model gave a limit';
    const [young, old] = ends(ageShifts).map((shift) => formatPlain(shift));
    const count = models.length === 1 ? '1 cooling model' : `${models.length} cooling models`;
    return `From ${limitsBetween(limits, run)} over ages ${young}${THIN_SPACE}σ to +${old}${THIN_SPACE}σ and ${count}`;
  },

  'overlap-rules': ({ shared, bracket }, run) => {
    const count = shared.length === 1 ? '1 shared star' : `${shared.length} shared stars`;
    const range = limitsBetween([bracket.lowest, bracket.highest], run);
    return `${count}: the limit lies from ${range} whatever the rule`;
  },

  influence: ({ stars, halfCarriedBy, limit }, run) => {
    const count = halfCarriedBy === 1 ? '1 star carries' : `${halfCarriedBy} stars carry`;
    const half = `${count} half of the sensitivity`;
    if (stars.length === 0) return half;
    const { name, without } = stars[0];
    return `${half}; without ${name} the limit is ${limitOf(without.limit, run)}, ${times(without.ratio)} the run’s ${formatLimit(limit, run.quantity)}`;
  },

  'population-comparison': ({ rows }) => {
    const others = rows.filter((row) => !row.isOwn && row.logBayesFactor !== null);
    if (others.length === 0) return 'No population could be weighed against the run’s own';
    const best = others.reduce((a, b) =>
      (b.logBayesFactor as number) > (a.logBayesFactor as number) ? b : a,
    );
    return `ln B = ${formatPlain(best.logBayesFactor as number, 2)} for ${best.name} against the run’s own`;
  },

  counts: ({ atRate, rate, counted }, { quantity }) => {
    const mean = atRate.reduce((sum, p, k) => sum + k * p, 0);
    const at =
      quantity === 'host_fraction'
        ? `a host fraction of ${formatRate(rate, quantity)}`
        : formatRate(rate, quantity).replace('per', 'planets per');
    return `${formatPlain(mean, 2)} detections expected at ${at}, ${counted} counted`;
  },

  forecast: (result, run) => {
    const { stars, yield: expected, chanceOfNone, limitIfNone, limitIfNoneTogether } = result;
    const together = `with the run ${limitOf(limitIfNoneTogether, run)}, now ${formatLimit(run.limit, run.quantity)}`;
    return (
      `${stars === 1 ? '1 star' : `${stars} stars`}: ${formatPlain(expected.mean, 2)} detections expected, ` +
      `${formatPercent(chanceOfNone)} chance of none; if none, ${together}; ` +
      `planned stars alone ${limitOf(limitIfNone, run)}`
    );
  },

  calibration: ({ verdict }) => verdict,
};

/** One sentence of a result, for lists. */
export function headlineOf(result: StudyResult, run: HeadlinedRun): string {
  const headline = headlines[result.kind] as Headline<StudyKind>;
  return headline(result, run);
}
