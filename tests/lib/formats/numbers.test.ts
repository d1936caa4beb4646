import { describe, expect, it } from 'vitest';
import { readNumberText } from '@/lib/formats/numbers';

describe('readNumberText(text, unit)', () => {
  it.each([
    ['1', 1],
    [' -2.5 ', -2.5],
    ['+.5', 0.5],
    ['3.', 3],
    ['1e-4', 1e-4],
    ['6.02E+23', 6.02e23],
    ['5e-324', 5e-324],
    ['-0', -0],
  ])('reads %s', (text, value) => {
    expect(readNumberText(text, '')).toBe(value);
  });

  it.each(['', '  ', 'nan', 'null', 'NULL', 'N/A', 'NA', '--', '…', 'NaN'])(
    'takes "%s" as missing',
    (text) => {
      expect(readNumberText(text, 'pc')).toBeNull();
    },
  );

  it.each([
    ['n.d.', 'not-a-number', 'a number in pc, or an empty cell'],
    ['15,3', 'not-a-number', 'a number with a decimal point in pc'],
    ['1,200', 'not-a-number', 'a number without thousands separators in pc'],
    ['0x1F', 'not-a-number', 'a decimal number in pc'],
    ['−21.25', 'not-a-number', 'the hyphen "-"'],
    ['１５', 'not-a-number', 'the digits 0-9'],
    ['1e999', 'not-finite', 'a finite number in pc'],
    ['-inf', 'not-finite', 'a finite number in pc'],
    ['Infinity', 'not-finite', 'a finite number in pc'],
    ['1 2', 'not-a-number', 'a number in pc, or an empty cell'],
    ['.', 'not-a-number', 'a number in pc, or an empty cell'],
    ['1_000', 'not-a-number', 'a number in pc, or an empty cell'],
    ['<5', 'not-a-number', 'a number in pc, or an empty cell'],
  ])('refuses %s', (text, code, expected) => {
    expect(readNumberText(text, 'pc')).toMatchObject({ code, expected });
  });
});
