import dynamic from 'next/dynamic';
import type { StudyKind, StudySettings } from '@/lib/schemas/study-settings';
import { calibrationInWords } from './calibration/calibration-words';
import { countsInWords } from './counts/counts-words';
import { forecastInWords } from './forecast/forecast-words';
import { freeIndicesInWords } from './free-indices/free-indices-words';
import { influenceInWords } from './influence/influence-words';
import type { KindEntry } from './kind-entry';
import { limitMapInWords } from './limit-map/limit-map-words';
import { overlapRulesInWords } from './overlap-rules/overlap-words';
import { comparisonInWords } from './population-comparison/comparison-words';
import { sweepInWords } from './sweep/sweep-words';
import { systematicsInWords } from './systematics/systematics-words';

const AnswerWaits = () => (
  <p className="max-w-none rounded-plate bg-well px-5 py-16 text-ink3 text-note" role="status">
    Drawing the answer
  </p>
);
const FormWaits = () => (
  <p className="max-w-none rounded-plate bg-well px-5 py-6 text-ink3 text-note" role="status">
    Opening the settings
  </p>
);

/**
 * Each kind brings its form, its answer and its numbers; a page loads those of one kind.
 * The options of `dynamic` must be written out at each call: the compiler reads them.
 */
export const kinds: { [Kind in StudyKind]: KindEntry<Kind> } = {
  systematics: {
    Form: dynamic(async () => (await import('./systematics/systematics-form')).SystematicsForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(
      async () => (await import('./systematics/systematics-answer')).SystematicsAnswer,
      { loading: AnswerWaits },
    ),
    settingsInWords: systematicsInWords,
    loadTables: async () => (await import('./systematics/systematics-tables')).systematicsTables,
  },
  influence: {
    Form: dynamic(async () => (await import('./influence/influence-form')).InfluenceForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./influence/influence-answer')).InfluenceAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: influenceInWords,
    loadTables: async () => (await import('./influence/influence-tables')).influenceTables,
  },
  'limit-map': {
    Form: dynamic(async () => (await import('./limit-map/limit-map-form')).LimitMapForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./limit-map/limit-map-answer')).LimitMapAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: limitMapInWords,
    loadTables: async () => (await import('./limit-map/limit-map-tables')).limitMapTables,
  },
  sweep: {
    Form: dynamic(async () => (await import('./sweep/sweep-form')).SweepForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./sweep/sweep-answer')).SweepAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: sweepInWords,
    loadTables: async () => (await import('./sweep/sweep-tables')).sweepTables,
  },
  'free-indices': {
    Form: dynamic(async () => (await import('./free-indices/free-indices-form')).FreeIndicesForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(
      async () => (await import('./free-indices/free-indices-answer')).FreeIndicesAnswer,
      { loading: AnswerWaits },
    ),
    settingsInWords: freeIndicesInWords,
    loadTables: async () => (await import('./free-indices/free-indices-tables')).freeIndicesTables,
  },
  'overlap-rules': {
    Form: dynamic(async () => (await import('./overlap-rules/overlap-form')).OverlapForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./overlap-rules/overlap-answer')).OverlapAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: overlapRulesInWords,
    loadTables: async () => (await import('./overlap-rules/overlap-tables')).overlapTables,
  },
  'population-comparison': {
    Form: dynamic(
      async () => (await import('./population-comparison/comparison-form')).ComparisonForm,
      { loading: FormWaits },
    ),
    Answer: dynamic(
      async () => (await import('./population-comparison/comparison-answer')).ComparisonAnswer,
      { loading: AnswerWaits },
    ),
    settingsInWords: comparisonInWords,
    loadTables: async () =>
      (await import('./population-comparison/comparison-tables')).comparisonTables,
  },
  counts: {
    Form: dynamic(async () => (await import('./counts/counts-form')).CountsForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./counts/counts-answer')).CountsAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: countsInWords,
    loadTables: async () => (await import('./counts/counts-tables')).countsTables,
  },
  calibration: {
    Form: dynamic(async () => (await import('./calibration/calibration-form')).CalibrationForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(
      async () => (await import('./calibration/calibration-answer')).CalibrationAnswer,
      { loading: AnswerWaits },
    ),
    settingsInWords: calibrationInWords,
    loadTables: async () => (await import('./calibration/calibration-tables')).calibrationTables,
  },
  forecast: {
    Form: dynamic(async () => (await import('./forecast/forecast-form')).ForecastForm, {
      loading: FormWaits,
    }),
    Answer: dynamic(async () => (await import('./forecast/forecast-answer')).ForecastAnswer, {
      loading: AnswerWaits,
    }),
    settingsInWords: forecastInWords,
    loadTables: async () => (await import('./forecast/forecast-tables')).forecastTables,
  },
};

/** Settings of any kind in words. */
export function settingsInWords(settings: StudySettings): string {
  return inWords(settings.kind, settings);
}

function inWords<Kind extends StudyKind>(
  kind: Kind,
  settings: Extract<StudySettings, { kind: Kind }>,
): string {
  return kinds[kind]?.settingsInWords(settings) ?? kind;
}
