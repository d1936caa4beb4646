import type { SettingsOf, SystematicChange } from '@/lib/schemas/study-settings';

const families: Record<SystematicChange['change'], string> = {
  'ages-young': 'ages',
  'ages-old': 'ages',
  'distances-near': 'distances',
  'distances-far': 'distances',
  cooling: 'cooling',
  threshold: 'threshold',
  'n-sigma-up': 'threshold',
  'n-sigma-down': 'threshold',
  eccentricity: 'eccentricities',
  combination: 'shared stars',
};

export function systematicsInWords({ changes }: SettingsOf<'systematics'>): string {
  if (changes === undefined) return 'every change that the surveys allow';
  const named = [...new Set(changes.map(({ change }) => families[change]))].join(', ');
  return `${changes.length} ${changes.length === 1 ? 'change' : 'changes'}: ${named}`;
}
