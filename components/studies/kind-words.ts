import type { HelpWord } from '@/lib/help';
import type { StudyKind } from '@/lib/schemas/study-settings';

interface KindWords {
  title: string;
  /** The question as a referee would put it. */
  question: string;
  /** The word of the help that explains it. */
  help: HelpWord;
}

/** Titles and questions, in the order in which they are listed. */
export const kindWords: Record<StudyKind, KindWords> = {
  systematics: {
    title: 'What moves the limit',
    help: 'systematics',
    question:
      'Of what the data rest on (ages, distances, cooling, thresholds, orbits, shared stars), what would move the limit most if it were wrong?',
  },
  'ages-cooling': {
    title: 'Ages and cooling',
    help: 'age-shift',
    question:
      'What if all stars were younger or older than adopted, or their planets had started hotter or colder?',
  },
  influence: {
    title: 'Which stars carry the limit',
    help: 'influence',
    question: 'Does the limit rest on a handful of stars, on one survey or on one young group?',
  },
  'limit-map': {
    title: 'Limit map',
    help: 'limit-map',
    question: 'For which planets, at which distance from their star, do these data say something?',
  },
  sweep: {
    title: 'Limit against ranges and indices',
    help: 'sweep',
    question:
      'How much does the limit depend on where a range was cut or on which slope was chosen?',
  },
  'free-indices': {
    title: 'Free indices',
    help: 'free-indices',
    question:
      'What becomes of the limit if the slopes are not known but fitted along with the rate?',
  },
  'overlap-rules': {
    title: 'Overlaps',
    help: 'shared-stars',
    question:
      'Some stars were observed by several surveys: what does the way of counting them change?',
  },
  'population-comparison': {
    title: 'Populations compared',
    help: 'evidence',
    question: 'Which of several planet populations do the detections speak for, and how strongly?',
  },
  counts: {
    title: 'How many detections',
    help: 'detection-counts',
    question: 'Is the number of detections what this rate predicts, and what would a repeat find?',
  },
  calibration: {
    title: 'Calibration',
    help: 'calibration',
    question:
      'If surveys like this one were simulated, how often would the limit lie above the truth?',
  },
  forecast: {
    title: 'Forecast',
    help: 'forecast',
    question: 'What would more stars or deeper images add?',
  },
};

export const kindOrder = Object.keys(kindWords) as StudyKind[];

export function isStudyKind(text: string): text is StudyKind {
  return Object.hasOwn(kindWords, text);
}

/** Where a question of a kind is asked and answered; an answer may be named. */
export function questionAddress(
  collaboration: string,
  analysis: string,
  kind: StudyKind,
  answerId?: string,
): string {
  if (kind === 'forecast') {
    const forecasts = `/${collaboration}/forecasts`;
    return answerId ? `${forecasts}/${answerId}` : `${forecasts}/new?analysis=${analysis}`;
  }
  const base = `/${collaboration}/analyses/${analysis}`;
  const page = kind === 'calibration' ? `${base}/calibration` : `${base}/studies/${kind}`;
  return answerId === undefined ? page : `${page}?answer=${answerId}`;
}
