import { quoteFound } from './reports';

/** Words that mean "no number here" in a numeric column. */
const missingWords = new Set([
  '',
  'nan',
  'null',
  'n/a',
  'na',
  '--',
  '…',
  'NaN',
  'NULL',
  'N/A',
  'NA',
]);
const decimal = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;

/** Why a text is no number, as the rest of a fault. */
export interface NumberProblem {
  code: 'not-a-number' | 'not-finite';
  found: string;
  expected: string;
}

export type NumberReading = number | null | NumberProblem;

export function isMissingWord(text: string): boolean {
  return missingWords.has(text);
}

/**
 * Reads the text of a numeric cell by the strict grammar; no repair is tried.
 *
 * @param unit the unit in which a number is expected, for the wording; '' for none
 * @returns the number, null where the cell says that it is missing, or what is wrong
 */
export function readNumberText(text: string, unit: string): NumberReading {
  const trimmed = text.trim();
  if (decimal.test(trimmed)) {
    const value = Number(trimmed);
    return Number.isFinite(value) ? value : tooLarge(trimmed, unit);
  }
  if (missingWords.has(trimmed)) return null;
  return explain(trimmed, unit === '' ? '' : ` in ${unit}`);
}

/** A typed number of a binary container: NaN is missing, infinities are refused. */
export function readTypedNumber(value: number | bigint, unit: string): NumberReading {
  const number = Number(value);
  if (Number.isNaN(number)) return null;
  return Number.isFinite(number) ? number : notFinite(String(number), unit);
}

function tooLarge(text: string, unit: string): NumberProblem {
  const problem = notFinite(text, unit);
  return { ...problem, found: `${problem.found}, which is too large to store` };
}

function notFinite(text: string, unit: string): NumberProblem {
  const inUnit = unit === '' ? '' : ` in ${unit}`;
  return { code: 'not-finite', found: quoteFound(text), expected: `a finite number${inUnit}` };
}

function explain(text: string, inUnit: string): NumberProblem {
  const found = quoteFound(text);
  const wrong = (expected: string, what = found): NumberProblem => ({
    code: 'not-a-number',
    found: what,
    expected,
  });
  if (/^[+-]?inf(inity)?$/i.test(text)) {
    return { code: 'not-finite', found, expected: `a finite number${inUnit}` };
  }
  if (/^[+-]?\d{1,3}(,\d{3})+(\.\d+)?$/.test(text)) {
    return wrong(`a number without thousands separators${inUnit}`);
  }
  if (/^[+-]?\d+,\d+$/.test(text)) return wrong(`a number with a decimal point${inUnit}`);
  if (/^[+-]?0[xob][\da-f]+$/i.test(text)) return wrong(`a decimal number${inUnit}`);
  if (/^[\u2010-\u2015\u2212][\d.]/.test(text)) {
    const sign = `U+${text.codePointAt(0)?.toString(16).toUpperCase().padStart(4, '0')}`;
    return wrong('the hyphen "-"', `${found} with the minus sign ${sign}`);
  }
  if (/\p{Nd}/u.test(text) && !/\d/.test(text)) return wrong('the digits 0-9');
  return wrong(`a number${inUnit}, or an empty cell`);
}
