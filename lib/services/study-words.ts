import { parameterWithUnit } from '@/lib/inference';
import type { StudyKind, StudySettings } from '@/lib/schemas/study-settings';

/** What each further question is called. */
export const studyNames: Record<StudyKind, string> = {
  'free-indices': 'Free indices',
  'limit-map': 'Limit map',
  sweep: 'Limit against a parameter',
  systematics: 'What moves the limit',
  'ages-cooling': 'Ages and cooling',
  'overlap-rules': 'Overlaps',
  influence: 'Which stars carry the limit',
  'population-comparison': 'Populations compared',
  counts: 'How many detections',
  forecast: 'Forecast',
  calibration: 'Calibration',
};

/** The same of one that was asked: a sweep names its parameter and the unit. */
export function nameOfStudy(settings: StudySettings): string {
  return settings.kind === 'sweep'
    ? `Limit against ${parameterWithUnit(settings.over)}`
    : studyNames[settings.kind];
}
