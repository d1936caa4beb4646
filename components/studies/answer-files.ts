import type { FigureSettings } from '@/components/charts/figure-context';
import type { StudyView } from '@/lib/schemas/studies';
import type { StudyKind } from '@/lib/schemas/study-settings';
import type { AnswerProps, KindEntry } from './kind-entry';
import { kindWords } from './kind-words';

/** "A-31-run-18-limit-map-3". */
export function answerFileName(study: StudyView): string {
  return `${study.run.analysisKey}-run-${study.run.number}-${study.settings.kind}-${study.number}`;
}

/** What every file of an answer says, whichever drawing it is of. */
export function answerFigures<Kind extends StudyKind>(
  entry: KindEntry<Kind>,
  answer: AnswerProps<Kind>,
): Omit<FigureSettings, 'toPdf'> {
  const { study, asked, settings } = answer;
  const { statement } = asked.result;
  const { title } = kindWords[study.settings.kind];
  return {
    file: answerFileName(study),
    title: `${title}, ${study.run.analysisKey}, run ${study.run.number}`,
    label: `${study.settings.kind === 'forecast' ? 'forecast' : 'draft'}, run ${study.run.number}`,
    caption: [
      `${title}: ${entry.settingsInWords(settings)}. ${study.headline ?? ''}`.trim(),
      `${statement.sentence}.`,
      statement.conditions.map((condition) => `${condition}.`).join(' '),
      `SHA-256 ${study.resultDigest ?? ''}, seed ${study.seed}, engine ${study.engineVersion}`,
    ],
    tables: async () => (await entry.loadTables())(answer),
  };
}

/** The whole answer with its settings and fingerprints. */
export function writeAnswerJson(study: StudyView, conditions: string[]): string {
  const { job: _job, ...answer } = study;
  return `${JSON.stringify({ state: 'draft', conditions, ...answer }, null, 1)}\n`;
}
