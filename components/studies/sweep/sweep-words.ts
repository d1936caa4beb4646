import { quotedSweepValue, sweptParameters } from '@/lib/inference';
import { formatRange } from '@/lib/quantities/display';
import type { SettingsOf } from '@/lib/schemas/study-settings';

/** "largest semi-major axis 30–1000 AU, 31 values". */
export function sweepInWords({ over, from, to, count }: SettingsOf<'sweep'>): string {
  const { name, unit } = sweptParameters[over];
  const values = over === 'both-indices' ? `${count} × ${count} values` : `${count} values`;
  if (unit === 'index') {
    const [low, high] = [quotedSweepValue(over, from), quotedSweepValue(over, to)];
    return `${name} ${formatRange(low, high, '').replace('–', ' to ')}, ${values}`;
  }
  return `${name} ${formatRange(from, to, unit)}, ${values}`;
}
