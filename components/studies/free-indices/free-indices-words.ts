import { formatIndex } from '@/components/populations/law-notation';
import { fromLogIndex } from '@/lib/population';
import type { SettingsOf } from '@/lib/schemas/study-settings';

/** "α −3 to 0, β −3 to 0, uniform": as dN/dM and dN/da. */
export function freeIndicesInWords(settings: SettingsOf<'free-indices'>): string {
  const range = ({ min, max }: { min: number; max: number }) =>
    `${formatIndex(fromLogIndex(min, 'linear'))} to ${formatIndex(fromLogIndex(max, 'linear'))}`;
  return `α uniform ${range(settings.massIndex)}, β uniform ${range(settings.semiMajorAxisIndex)}, of dN/dM and dN/da`;
}

/** One sentence on what letting the indices go does to the limit. */
export function freeAgainstFixed(free: number, fixed: number): string {
  const change = free / fixed - 1;
  if (Math.abs(change) < 0.005) return 'Letting the indices go does not move the limit.';
  const percent = Math.abs(100 * change).toFixed(Math.abs(change) < 0.1 ? 1 : 0);
  return `Letting the indices go ${change > 0 ? 'raises' : 'lowers'} the limit by ${percent}\u2009% of itself.`;
}

/** An index of the posterior: two decimals, a true minus sign, none before a zero. */
export function indexOfPosterior(value: number): string {
  const text = value.toFixed(2);
  return Number(text) === 0 ? '0' : text.replace('-', '\u2212');
}
