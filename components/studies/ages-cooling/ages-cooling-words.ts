import type { SettingsOf } from '@/lib/schemas/study-settings';

export function agesCoolingInWords({ coolingTableIds }: SettingsOf<'ages-cooling'>): string {
  if (coolingTableIds === undefined) return 'up to two other cooling models that fit';
  if (coolingTableIds.length === 0) return 'the cooling model of the run';
  return coolingTableIds.length === 1 ? '1 other cooling model' : '2 other cooling models';
}
