import type { Fault } from '@/lib/errors';
import type { BoundColumn } from './columns';
import { readDate } from './dates';
import { uploadLimits } from './limits';
import { findControl, findNameProblem } from './names';
import { isMissingWord, type NumberReading, readNumberText, readTypedNumber } from './numbers';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { Place, RawTable } from './table';

/** What a number must satisfy, in our unit. */
export interface NumberRule {
  /** Exclusive lower bound. */
  above?: number;
  min?: number;
  max?: number;
  /** Exclusive upper bound. */
  below?: number;
  code?: 'out-of-range' | 'probability-range';
  /** Words for what was expected, where the bounds alone read badly. */
  expected?: string;
  hint?: string;
}

export const positive: NumberRule = { above: 0 };
export const notNegative: NumberRule = { min: 0 };
export const probability: NumberRule = { min: 0, max: 1, code: 'probability-range' };

/** A cell that was refused; the fault is in the report. Not the same as a missing one (null). */
export const refused = undefined;
export type Cell<T> = T | null | typeof refused;

function satisfies(value: number, rule: NumberRule): boolean {
  if (rule.above !== undefined && !(value > rule.above)) return false;
  if (rule.min !== undefined && !(value >= rule.min)) return false;
  if (rule.max !== undefined && !(value <= rule.max)) return false;
  return rule.below === undefined || value < rule.below;
}

function describeRule(rule: NumberRule, unit: string): string {
  const inUnit = unit === '' ? '' : ` ${unit}`;
  if (rule.expected !== undefined) return rule.expected;
  if (rule.min !== undefined && rule.max !== undefined)
    return `${rule.min} to ${rule.max}${inUnit}`;
  const parts: string[] = [];
  if (rule.above !== undefined) parts.push(`more than ${rule.above}`);
  if (rule.min !== undefined) parts.push(`${rule.min} or more`);
  if (rule.max !== undefined) parts.push(`at most ${rule.max}`);
  if (rule.below !== undefined) parts.push(`less than ${rule.below}`);
  return parts.length === 0 ? 'a number that can be stored' : parts.join(' and ') + inUnit;
}

/** A bound table with its reports: every cell is asked for by our column name and its row. */
export class TableReading {
  /** False where the container dropped rows, so that a gap says nothing about the file. */
  readonly isComplete: boolean;

  constructor(
    readonly table: RawTable,
    private readonly columns: ReadonlyMap<string, BoundColumn>,
    readonly faults: FaultReport,
    readonly notes: NoteReport,
  ) {
    this.isComplete = faults.count === 0;
  }

  has(name: string): boolean {
    return this.columns.has(name);
  }

  /** Bound names, in the order of the file. */
  names(): string[] {
    return [...this.columns.keys()];
  }

  column(name: string): BoundColumn | undefined {
    return this.columns.get(name);
  }

  place(row: number, name?: string): Place {
    const place = this.table.rowPlace(row);
    return name === undefined ? place : { ...place, column: this.label(name) };
  }

  fault(place: Place, fault: Fault): void {
    this.faults.add({ ...place, ...fault });
  }

  /** The text of a cell, trimmed; null where it is empty or there is no such column. */
  raw(name: string, row: number): string | null {
    const cell = this.columns.get(name)?.raw.cells[row] ?? null;
    if (cell === null) return null;
    const text = String(cell).trim();
    return text === '' ? null : text;
  }

  number(name: string, row: number, rule: NumberRule = {}): Cell<number> {
    const column = this.columns.get(name);
    const cell = column?.raw.cells[row] ?? null;
    if (column === undefined || cell === null || cell === '') return null;
    const reading = this.readNumber(cell, column);
    if (reading === null) {
      this.noteMissing(name, row);
      return null;
    }
    if (typeof reading !== 'number') {
      this.fault(this.place(row, name), reading);
      return refused;
    }
    const value = column.toOurUnit === null ? reading : column.toOurUnit(reading);
    if (satisfies(value, rule) && Number.isFinite(value)) return value;
    const found = String(cell).trim();
    this.fault(this.place(row, name), {
      code: rule.code ?? 'out-of-range',
      found: column.isFluxRatio ? `a flux ratio of ${found}` : found,
      expected: column.isFluxRatio
        ? 'more than 0 and at most 1'
        : describeRule(rule, column.ourUnit),
      ...(rule.hint === undefined ? {} : { hint: rule.hint }),
    });
    return refused;
  }

  /** A short text under the rule for names. */
  text(name: string, row: number, most: number = uploadLimits.nameCharacters): Cell<string> {
    const text = this.raw(name, row);
    if (text === null) return null;
    const problem = findNameProblem(text, 'a text', most);
    if (problem === null) return text;
    this.fault(this.place(row, name), problem);
    return refused;
  }

  /** Free text with line breaks; spaces around it are kept. */
  prose(name: string, row: number): Cell<string> {
    const cell = this.columns.get(name)?.raw.cells[row] ?? null;
    if (cell === null || String(cell).trim() === '') return null;
    const problem = findControl(String(cell), true);
    if (problem === null) return String(cell);
    this.fault(this.place(row, name), problem);
    return refused;
  }

  choice<T extends string>(name: string, row: number, choices: readonly T[]): Cell<T> {
    const text = this.raw(name, row);
    if (text === null) return null;
    const found = choices.find((choice) => choice === text.toLowerCase());
    if (found !== undefined) return found;
    const last = choices[choices.length - 1];
    this.fault(this.place(row, name), {
      code: 'choice-unknown',
      found: quoteFound(text),
      expected: `${choices.slice(0, -1).join(', ')} or ${last}`,
    });
    return refused;
  }

  boolean(name: string, row: number): Cell<boolean> {
    const text = this.raw(name, row);
    if (text === null) return null;
    if (/^(true|t|1|yes)$/i.test(text)) return true;
    if (/^(false|f|0|no)$/i.test(text)) return false;
    this.fault(this.place(row, name), {
      code: 'not-a-boolean',
      found: quoteFound(text),
      expected: 'true or false',
    });
    return refused;
  }

  date(name: string, row: number): Cell<string> {
    const text = this.raw(name, row);
    if (text === null || isMissingWord(text)) return null;
    const reading = readDate(text);
    if ('value' in reading) return reading.value;
    const found = quoteFound(text);
    this.fault(
      this.place(row, name),
      reading.problem === 'no-date'
        ? { code: 'date-invalid', message: `found ${found}, which is no date` }
        : {
            code: 'date-invalid',
            found,
            expected: 'a date as 2014-05-01, or a Modified Julian Date',
          },
    );
    return refused;
  }

  /** Reports a needed cell that is empty. */
  missing(name: string, row: number, expected: string): void {
    this.fault(this.place(row, name), { code: 'value-missing', found: 'nothing', expected });
  }

  private label(name: string): string {
    return this.columns.get(name)?.label ?? name;
  }

  private readNumber(cell: string | number | bigint | boolean, column: BoundColumn): NumberReading {
    if (typeof cell === 'string') return readNumberText(cell, column.unit ?? '');
    if (typeof cell === 'boolean') return readNumberText(String(cell), column.unit ?? '');
    return readTypedNumber(cell, column.unit ?? '');
  }

  private noteMissing(name: string, row: number): void {
    const text = this.raw(name, row);
    if (text === null) return;
    const message = `${quoteFound(text)} in a numeric column reads as missing`;
    this.notes.inform('read-as-missing', message, this.place(row, name));
  }
}
