import dynamic from 'next/dynamic';
import type { StudyKind, StudySettings } from '@/lib/schemas/study-settings';
import { agesCoolingInWords } from './ages-cooling/ages-cooling-words';
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

/**
 * Each kind brings its form, its answer and its numbers; a page loads those of one kind.
 * Without a `loading` of their own they come with the page at once: a page that is sent in parts
 * would show that first, even where nothing is waited for, and then move.
 */
export const kinds: { [Kind in StudyKind]: KindEntry<Kind> } = {
  systematics: {
    Form: dynamic(async () => (await import('./systematics/systematics-form')).SystematicsForm),
    Answer: dynamic(
      async () => (await import('./systematics/systematics-answer')).SystematicsAnswer,
    ),
    settingsInWords: systematicsInWords,
    loadTables: async () => (await import('./systematics/systematics-tables')).systematicsTables,
  },
  'ages-cooling': {
    Form: dynamic(async () => (await import('./ages-cooling/ages-cooling-form')).AgesCoolingForm),
    Answer: dynamic(
      async () => (await import('./ages-cooling/ages-cooling-answer')).AgesCoolingAnswer,
    ),
    settingsInWords: agesCoolingInWords,
    loadTables: async () => (await import('./ages-cooling/ages-cooling-tables')).agesCoolingTables,
  },
  influence: {
    Form: dynamic(async () => (await import('./influence/influence-form')).InfluenceForm),
    Answer: dynamic(async () => (await import('./influence/influence-answer')).InfluenceAnswer),
    settingsInWords: influenceInWords,
    loadTables: async () => (await import('./influence/influence-tables')).influenceTables,
  },
  'limit-map': {
    Form: dynamic(async () => (await import('./limit-map/limit-map-form')).LimitMapForm),
    Answer: dynamic(async () => (await import('./limit-map/limit-map-answer')).LimitMapAnswer),
    settingsInWords: limitMapInWords,
    loadTables: async () => (await import('./limit-map/limit-map-tables')).limitMapTables,
  },
  sweep: {
    Form: dynamic(async () => (await import('./sweep/sweep-form')).SweepForm),
    Answer: dynamic(async () => (await import('./sweep/sweep-answer')).SweepAnswer),
    settingsInWords: sweepInWords,
    loadTables: async () => (await import('./sweep/sweep-tables')).sweepTables,
  },
  'free-indices': {
    Form: dynamic(async () => (await import('./free-indices/free-indices-form')).FreeIndicesForm),
    Answer: dynamic(
      async () => (await import('./free-indices/free-indices-answer')).FreeIndicesAnswer,
    ),
    settingsInWords: freeIndicesInWords,
    loadTables: async () => (await import('./free-indices/free-indices-tables')).freeIndicesTables,
  },
  'overlap-rules': {
    Form: dynamic(async () => (await import('./overlap-rules/overlap-form')).OverlapForm),
    Answer: dynamic(async () => (await import('./overlap-rules/overlap-answer')).OverlapAnswer),
    settingsInWords: overlapRulesInWords,
    loadTables: async () => (await import('./overlap-rules/overlap-tables')).overlapTables,
  },
  'population-comparison': {
    Form: dynamic(
      async () => (await import('./population-comparison/comparison-form')).ComparisonForm,
    ),
    Answer: dynamic(
      async () => (await import('./population-comparison/comparison-answer')).ComparisonAnswer,
    ),
    settingsInWords: comparisonInWords,
    loadTables: async () =>
      (await import('./population-comparison/comparison-tables')).comparisonTables,
  },
  counts: {
    Form: dynamic(async () => (await import('./counts/counts-form')).CountsForm),
    Answer: dynamic(async () => (await import('./counts/counts-answer')).CountsAnswer),
    settingsInWords: countsInWords,
    loadTables: async () => (await import('./counts/counts-tables')).countsTables,
  },
  calibration: {
    Form: dynamic(async () => (await import('./calibration/calibration-form')).CalibrationForm),
    Answer: dynamic(
      async () => (await import('./calibration/calibration-answer')).CalibrationAnswer,
    ),
    settingsInWords: calibrationInWords,
    loadTables: async () => (await import('./calibration/calibration-tables')).calibrationTables,
  },
  forecast: {
    Form: dynamic(async () => (await import('./forecast/forecast-form')).ForecastForm),
    Answer: dynamic(async () => (await import('./forecast/forecast-answer')).ForecastAnswer),
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
