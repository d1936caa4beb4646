import type { StudyKind } from '@/lib/schemas/study-settings';

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
