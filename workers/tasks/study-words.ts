import { quotedValue } from '@/lib/inference/sweep-parameters';
import {
  formatLimit,
  formatPercent,
  formatPlain,
  formatRate,
  type RateQuantity,
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

type Headline<Kind extends StudyKind> = (
  result: ResultOf<Kind>,
  run: { quantity: RateQuantity },
) => string;

const least = (values: readonly (number | null)[]) =>
  values.reduce<number>(
    (least, value) => (value !== null && value < least ? value : least),
    Number.POSITIVE_INFINITY,
  );
const times = (ratio: number) => `${formatPlain(ratio, 3)} times`;

const headlines: { [Kind in StudyKind]: Headline<Kind> } = {
  'free-indices': ({ limit, limitFixed }, { quantity }) =>
    `${formatLimit(limit, quantity)} with free indices, ${formatLimit(limitFixed, quantity)} with fixed ones`,

  'limit-map': ({ limit, massMjup, semiMajorAxisAu }, { quantity }) => {
    const lowest = least(limit.flat());
    const row = limit.findIndex((values) => values.includes(lowest));
    const column = limit[row].indexOf(lowest);
    const place = `${formatPlain(massMjup[row], 2)} MJ and ${formatPlain(semiMajorAxisAu[column], 2)} AU`;
    return `${formatLimit(lowest, quantity)} at best, at ${place}`;
  },

  sweep: ({ over, limit, value, plane }, { quantity }) => {
    if (plane) {
      const all = plane.limit.flat();
      return `From ${formatLimit(Math.min(...all), quantity)} to ${formatLimit(Math.max(...all), quantity)} over both indices`;
    }
    const last = value.length - 1;
    return (
      `${formatLimit(limit[0], quantity)} at ${formatPlain(quotedValue(over, value[0]))}, ` +
      `${formatLimit(limit[last], quantity)} at ${formatPlain(quotedValue(over, value[last]))}`
    );
  },

  systematics: ({ rows, baseline }, { quantity }) => {
    const moved = rows
      .filter(({ ratio }) => ratio !== null)
      .sort(
        (a, b) =>
          Math.abs(Math.log(b.ratio as number)) - Math.abs(Math.log(a.ratio as number)) ||
          (a.label < b.label ? -1 : 1),
      );
    if (moved.length === 0)
      return `No change gave a limit beside ${formatLimit(baseline, quantity)}`;
    const { label, ratio, limit } = moved[0];
    return `Most: ${label}, ${formatLimit(limit as number, quantity)}, ${times(ratio as number)} the run's`;
  },

  'ages-cooling': ({ models, ageShifts }, { quantity }) => {
    const limits = models.flatMap(({ shifts }) => shifts.flatMap(({ limit }) => limit ?? []));
    if (limits.length === 0) return 'No age and no cooling model gave a limit';
    const ends = [Math.min(...limits), Math.max(...limits)].map((one) =>
      formatLimit(one, quantity),
    );
    const range = `${formatPlain(ageShifts[0])} to +${formatPlain(ageShifts[ageShifts.length - 1])}`;
    const count = models.length === 1 ? '1 cooling model' : `${models.length} cooling models`;
    return `From ${ends[0]} to ${ends[1]} over ages ${range} sigma and ${count}`;
  },

  'overlap-rules': ({ shared, bracket }, { quantity }) => {
    const count = shared.length === 1 ? '1 shared star' : `${shared.length} shared stars`;
    const ends = [bracket.lowest, bracket.highest].map((limit) => formatLimit(limit, quantity));
    return `${count}: the limit lies from ${ends[0]} to ${ends[1]} whatever the rule`;
  },

  influence: ({ stars, halfCarriedBy }) => {
    const count = halfCarriedBy === 1 ? '1 star carries' : `${halfCarriedBy} stars carry`;
    return `${count} half of the exposure; without ${stars[0].name} the limit is ${times(stars[0].without.ratio)} the run's`;
  },

  'population-comparison': ({ rows }) => {
    const others = rows.filter((row) => !row.isOwn && row.logBayesFactor !== null);
    if (others.length === 0) return 'No population could be weighed against the run’s own';
    const best = others.reduce((a, b) =>
      (b.logBayesFactor as number) > (a.logBayesFactor as number) ? b : a,
    );
    return `ln B = ${formatPlain(best.logBayesFactor as number, 2)} for ${best.name} against the run's own`;
  },

  counts: ({ atRate, rate, counted }, { quantity }) => {
    const mean = atRate.reduce((sum, p, k) => sum + k * p, 0);
    return `${formatPlain(mean, 2)} detections expected at ${formatRate(rate, quantity)}, ${counted} counted`;
  },

  forecast: ({ stars, yield: expected, chanceOfNone, limitIfNone }, { quantity }) =>
    `${stars} stars: ${formatPlain(expected.mean, 2)} detections expected, ` +
    `${formatPercent(chanceOfNone)} chance of none, then ${formatLimit(limitIfNone, quantity)}`,

  calibration: ({ verdict }) => verdict,
};

/** One sentence of a result, for lists. */
export function headlineOf(result: StudyResult, quantity: RateQuantity): string {
  const headline = headlines[result.kind] as Headline<StudyKind>;
  return headline(result, { quantity });
}
