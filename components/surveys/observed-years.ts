import type { SurveyView } from '@/lib/schemas/surveys';

/** "2015–2019", one year alone, or a dash. */
export function observedYears(survey: Pick<SurveyView, 'observedFrom' | 'observedTo'>): string {
  const { observedFrom: from, observedTo: to } = survey;
  if (from === null && to === null) return '–';
  if (from === null || to === null || from === to) return String(from ?? to);
  return `${from}–${to}`;
}
