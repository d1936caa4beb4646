import type { StudyView } from '@/lib/schemas/studies';

/** Numbers behind a drawing as a file holds them: unrounded, unit in the name of the column. */
export interface DataTable {
  name: string;
  columns: string[];
  rows: (number | string | boolean | null)[][];
}

const SIGNIFICANT = 9;

function cell(value: number | string | boolean | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(Number(value.toPrecision(SIGNIFICANT)));
  const text = String(value);
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** "A-31-run-18-limit-map-3". */
export function answerFileName(study: StudyView): string {
  return `${study.run.analysisKey}-run-${study.run.number}-${study.settings.kind}-${study.number}`;
}

/** What every file of an answer says before its numbers. */
export function fileHead(study: StudyView, conditions: string[]): string[] {
  return [
    `${study.run.analysisKey}, run ${study.run.number}, question ${study.number}, draft`,
    ...(study.headline === null ? [] : [study.headline]),
    ...conditions,
    `seed ${study.seed}`,
    `engine ${study.engineVersion}`,
    `inputs SHA-256 ${study.inputsDigest ?? ''}`,
    `result SHA-256 ${study.resultDigest ?? ''}`,
  ];
}

/** Lines that begin with # say what the numbers rest on; several tables follow each other. */
export function writeDataCsv(head: string[], tables: DataTable[]): string {
  const lines = head.map((line) => `# ${line.replaceAll(/[\r\n]+/g, ' ')}`);
  for (const table of tables) {
    if (tables.length > 1) lines.push(`# ${table.name}`);
    lines.push(table.columns.map(cell).join(','));
    for (const row of table.rows) lines.push(row.map(cell).join(','));
  }
  return `${lines.join('\n')}\n`;
}

/** The whole answer with its settings and fingerprints. */
export function writeAnswerJson(study: StudyView, conditions: string[]): string {
  const { job: _job, ...answer } = study;
  return `${JSON.stringify({ state: 'draft', conditions, ...answer }, null, 1)}\n`;
}
