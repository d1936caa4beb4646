import { formatPlain } from '@/lib/quantities/display';
import type { SettingsOf } from '@/lib/schemas/study-settings';
import { type Draft, readNumber } from '../use-settings-form';

/** Columns of a planned target, in the order in which they are typed and pasted. */
export const targetColumns = [
  { name: 'name', head: 'star', isNumber: false, isNeeded: true },
  { name: 'distancePc', head: 'distance, pc', isNumber: true, isNeeded: true },
  { name: 'distanceErrorPc', head: 'distance error, pc', isNumber: true, isNeeded: false },
  { name: 'ageMyr', head: 'age, Myr', isNumber: true, isNeeded: true },
  { name: 'ageLowerMyr', head: 'age at 16 %, Myr', isNumber: true, isNeeded: false },
  { name: 'ageUpperMyr', head: 'age at 84 %, Myr', isNumber: true, isNeeded: false },
  { name: 'hostMag', head: 'magnitude of the star', isNumber: true, isNeeded: true },
  { name: 'hostMassMsun', head: 'mass, solar masses', isNumber: true, isNeeded: false },
] as const;

/** The points of the assumed curve. */
export const curveColumns = [
  { name: 'separationArcsec', head: 'separation, arcsec' },
  { name: 'contrastMag', head: 'contrast, mag' },
] as const;

export const TARGET_ROWS = 'targetRows';
export const CURVE_ROWS = 'curveRows';
const FIRST_CURVE_ROWS = 5;

export const targetKey = (row: number, column: string) => `planned.targets.${row}.${column}`;
export const curveKey = (row: number, column: string) => `planned.curve.${column}.${row}`;

const text = (value: number | undefined) => (value === undefined ? '' : formatPlain(value, 10));

type Forecast = SettingsOf<'forecast'>;

/** The fields of a forecast, empty or as an earlier one had them. */
export function draftOfForecast(start: Forecast | undefined): Draft {
  const planned = start?.planned;
  const likeThese = planned?.kind === 'stars-like-these' ? planned : undefined;
  const list = planned?.kind === 'targets' ? planned : undefined;
  const curveRows = list?.curve.separationArcsec.length ?? FIRST_CURVE_ROWS;
  const draft: Draft = {
    name: start?.name ?? '',
    'planned.kind': planned?.kind ?? 'stars-like-these',
    'planned.count': text(likeThese?.count ?? 100),
    'planned.deeperByMag': text(likeThese?.deeperByMag ?? 0),
    'planned.surveyIds': likeThese?.surveyIds?.join() ?? '',
    'planned.curve.band': list?.curve.band ?? '',
    'planned.curve.nSigma': text(list?.curve.nSigma ?? 5),
    assumedRate: start?.assumedRate === undefined ? '' : text(100 * start.assumedRate),
    wantedLimit: start?.wantedLimit === undefined ? '' : text(100 * start.wantedLimit),
    [TARGET_ROWS]: String(list?.targets.length ?? 1),
    [CURVE_ROWS]: String(curveRows),
  };
  for (const [row, target] of (list?.targets ?? [undefined]).entries()) {
    for (const { name } of targetColumns) {
      const value = target?.[name];
      draft[targetKey(row, name)] = typeof value === 'number' ? text(value) : (value ?? '');
    }
  }
  for (let row = 0; row < curveRows; row += 1) {
    for (const { name } of curveColumns) draft[curveKey(row, name)] = text(list?.curve[name][row]);
  }
  return draft;
}

const typed = (value: string) => readNumber(value) ?? value;
const share = (value: string) => {
  const percentage = readNumber(value);
  // A hundredth of 2.9 has no more digits than 2.9 has.
  return percentage === undefined ? value : Number((percentage / 100).toPrecision(12));
};

/** The draft in the shape that the schema reads. */
export function readForecast(draft: Draft): unknown {
  const { name, assumedRate, wantedLimit } = draft;
  return {
    kind: 'forecast',
    name,
    planned: draft['planned.kind'] === 'targets' ? readTargets(draft) : readLikeThese(draft),
    ...(assumedRate.trim() !== '' && { assumedRate: share(assumedRate) }),
    ...(wantedLimit.trim() !== '' && { wantedLimit: share(wantedLimit) }),
  };
}

function readLikeThese(draft: Draft) {
  const surveyIds = draft['planned.surveyIds'];
  const deeper = draft['planned.deeperByMag'];
  return {
    kind: 'stars-like-these',
    count: typed(draft['planned.count']),
    ...(surveyIds !== '' && { surveyIds: surveyIds.split(',') }),
    ...(deeper.trim() !== '' && { deeperByMag: typed(deeper) }),
  };
}

function readTargets(draft: Draft) {
  const rows = (key: string) => Array.from({ length: Number(draft[key]) }, (_, row) => row);
  const targets = rows(TARGET_ROWS).map((row) =>
    Object.fromEntries(
      targetColumns.flatMap(({ name, isNumber, isNeeded }) => {
        const cell = draft[targetKey(row, name)] ?? '';
        if (cell.trim() === '' && !isNeeded) return [];
        return [[name, isNumber ? typed(cell) : cell]];
      }),
    ),
  );
  const column = (name: string) =>
    rows(CURVE_ROWS)
      .filter((row) => curveColumns.some((one) => draft[curveKey(row, one.name)]?.trim()))
      .map((row) => typed(draft[curveKey(row, name)] ?? ''));
  return {
    kind: 'targets',
    targets,
    curve: {
      band: draft['planned.curve.band'],
      nSigma: typed(draft['planned.curve.nSigma']),
      separationArcsec: column('separationArcsec'),
      contrastMag: column('contrastMag'),
    },
  };
}

interface Grid {
  rowsKey: string;
  columns: readonly { name: string }[];
  keyOf(row: number, column: string): string;
}
export const targetGrid: Grid = { rowsKey: TARGET_ROWS, columns: targetColumns, keyOf: targetKey };
export const curveGrid: Grid = { rowsKey: CURVE_ROWS, columns: curveColumns, keyOf: curveKey };

export function addRow(draft: Draft, { rowsKey, columns, keyOf }: Grid): Draft {
  const rows = Number(draft[rowsKey]);
  const next: Draft = { ...draft, [rowsKey]: String(rows + 1) };
  for (const { name } of columns) next[keyOf(rows, name)] = '';
  return next;
}

/** The rows below move up; the last one stays, emptied. */
export function removeRow(draft: Draft, row: number, { rowsKey, columns, keyOf }: Grid): Draft {
  const rows = Number(draft[rowsKey]);
  const next: Draft = { ...draft, [rowsKey]: String(Math.max(1, rows - 1)) };
  for (const { name } of columns) {
    for (let at = row; at < rows - 1; at += 1) next[keyOf(at, name)] = draft[keyOf(at + 1, name)];
    if (rows > 1) delete next[keyOf(rows - 1, name)];
    else next[keyOf(0, name)] = '';
  }
  return next;
}

/**
 * Cells of a spreadsheet put in from one cell on; rows are added as they are needed.
 *
 * @returns undefined for a text of one cell, which the field takes by itself
 */
export function pasteCells(
  draft: Draft,
  [row, column]: [number, number],
  pasted: string,
  { rowsKey, columns, keyOf }: Grid,
): Draft | undefined {
  const lines = pasted.replace(/[\r\n]+$/, '').split(/\r\n|\r|\n/);
  const cells = lines.map((line) => line.split('\t').map((cell) => cell.trim()));
  if (cells.length === 1 && cells[0].length === 1) return undefined;
  const rows = Math.max(Number(draft[rowsKey]), row + cells.length);
  const next: Draft = { ...draft, [rowsKey]: String(rows) };
  for (const [i, line] of cells.entries()) {
    for (const [j, cell] of line.entries()) {
      const name = columns[column + j]?.name;
      if (name !== undefined) next[keyOf(row + i, name)] = cell;
    }
  }
  return next;
}
