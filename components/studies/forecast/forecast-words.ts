import { formatLimit, formatPlain, formatRate, type RateQuantity } from '@/lib/quantities/display';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';

/** "120 stars like these, curves 1 mag deeper". */
export function plannedInWords({ planned }: SettingsOf<'forecast'>): string {
  if (planned.kind === 'targets') {
    const { length } = planned.targets;
    return `${length} ${length === 1 ? 'target' : 'targets'} of a list, one assumed curve in ${planned.curve.band}`;
  }
  const { count, surveyIds, deeperByMag } = planned;
  const like = surveyIds
    ? `like those of ${surveyIds.length} ${surveyIds.length === 1 ? 'survey' : 'surveys'}`
    : 'like those of the run';
  const stars = `${count} ${count === 1 ? 'star' : 'stars'} ${like}`;
  if (deeperByMag === 0) return stars;
  const depth = deeperByMag > 0 ? 'deeper' : 'shallower';
  return `${stars}, curves ${formatPlain(Math.abs(deeperByMag))} mag ${depth}`;
}

export function forecastInWords(settings: SettingsOf<'forecast'>): string {
  return `${settings.name}: ${plannedInWords(settings)}`;
}

/** "at a host fraction of 2.5 %", or with the rate as far as the run knows it. */
export function forecastRateInWords(
  assumedRate: number | undefined,
  quantity: RateQuantity,
): string {
  if (assumedRate === undefined) return 'with the rate from the posterior of the run';
  return quantity === 'host_fraction'
    ? `at a host fraction of ${formatRate(assumedRate, quantity)}`
    : `at ${formatRate(assumedRate, quantity).replace('per', 'planets per')}`;
}

/** How many such stars the wanted limit takes. */
export function neededInWords(
  { starsNeeded, wantedLimit }: ResultOf<'forecast'>,
  quantity: RateQuantity,
): string {
  const wanted = formatLimit(wantedLimit, quantity);
  if (starsNeeded === null) {
    return `No number of such stars up to 100,000 reaches ${wanted} by itself, even if nothing is found.`;
  }
  const stars = starsNeeded === 1 ? '1 such star' : `${starsNeeded} such stars`;
  return `${stars} would be needed for ${wanted} by themselves, if nothing is found.`;
}
