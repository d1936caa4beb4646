import type { SettingsOf } from '@/lib/schemas/study-settings';

export function limitMapInWords({ tailCumulative }: SettingsOf<'limit-map'>): string {
  return tailCumulative
    ? 'at each mass and semi-major axis, and beyond each'
    : 'at each mass and semi-major axis';
}
