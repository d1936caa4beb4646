import { describe, expect, it } from 'vitest';
import { escapeLatex, type LatexTable, latexMeasurement, writeLatexTable } from '@/lib/formats';

const table: LatexTable = {
  caption: 'Limits at 95 % for A & B',
  label: 'tab:limits',
  columns: [
    { heading: 'Star', align: 'l' },
    { heading: 'Mass', unit: 'Mjup' },
    { heading: 'Axis', unit: 'AU' },
  ],
  rows: [
    ['* alf_Cen', { below: '12.3' }, null],
    ['[FLG2003] 7', { value: '3.1', plus: '2.2', minus: '1.4' }, 1.5e-7],
    ['RB 1', { value: '24', plus: '3', minus: '3' }, -4],
  ],
  notes: ['Uniform prior.', 'Rounded to two figures.'],
};

describe('escapeLatex(text)', () => {
  it('escapes the ten special characters', () => {
    expect(escapeLatex('& % _ # $ { } ~ ^ \\')).toBe(
      '\\& \\% \\_ \\# \\$ \\{ \\} \\textasciitilde{} \\textasciicircum{} \\textbackslash{}',
    );
  });

  it('sets signs that text fonts lack in mathematics, and joins lines', () => {
    expect(escapeLatex('a < b − c ± d\n\ne')).toBe('a $<$ b $-$ c $\\pm$ d e');
    expect(escapeLatex('<5.8\u2009%')).toBe('$<$5.8\\,\\%');
  });
});

describe('writeLatexTable(table, style)', () => {
  it('writes a plain tabular', () => {
    expect(writeLatexTable(table, 'tabular')).toBe(`\\begin{table}
\\centering
\\caption{Limits at 95 \\% for A \\& B}\\label{tab:limits}
\\begin{tabular}{lcc}
\\hline
Star & Mass & Axis \\\\
 & ($M_{\\mathrm{Jup}}$) & (au) \\\\
\\hline
{}* alf\\_Cen & $<12.3$ & \\ldots \\\\
{}[FLG2003] 7 & $3.1^{+2.2}_{-1.4}$ & $1.5\\times10^{-7}$ \\\\
RB 1 & $24 \\pm 3$ & $-4$ \\\\
\\hline
\\end{tabular}

\\par\\small Uniform prior. Rounded to two figures.
\\end{table}
`);
  });

  it('writes a deluxetable without a line end after the last row', () => {
    const text = writeLatexTable(table, 'deluxetable');
    expect(text).toContain(
      '\\tablehead{\\colhead{Star} & \\colhead{Mass} & \\colhead{Axis} \\\\ \\colhead{} & ',
    );
    expect(text).toContain('\\startdata\n{}* alf\\_Cen & $<12.3$ & \\nodata \\\\\n');
    expect(text).toContain('RB 1 & $24 \\pm 3$ & $-4$\n\\enddata\n\\tablecomments{Uniform prior. ');
    expect(text.match(/\\begin\{deluxetable\}\{lcc\}/g)).toHaveLength(1);
  });

  it('refuses rows of another length, infinite numbers and odd labels', () => {
    expect(() => writeLatexTable({ ...table, rows: [['a']] }, 'tabular')).toThrow(
      'a row must have 3 cells, got 1',
    );
    expect(() => writeLatexTable({ ...table, rows: [['a', Number.NaN, null]] }, 'tabular')).toThrow(
      RangeError,
    );
    expect(() => writeLatexTable({ ...table, label: 'a}b' }, 'tabular')).toThrow(RangeError);
  });
});

describe('latexMeasurement(value, plus, minus)', () => {
  it.each([
    [3.1234, 2.2, 1.4, ['3.1', '2.2', '1.4']],
    [0.01234, 0.0021, 0.0034, ['0.0123', '0.0021', '0.0034']],
    [409, 81.8, 81.8, ['409', '82', '82']],
    [12345, 678, 912, ['12345', '678', '912']],
  ])(
    'gives %d with errors %d and %d two figures of the smaller error',
    (value, plus, minus, texts) => {
      const cell = latexMeasurement(value, plus, minus);
      expect(Object.values(cell as object)).toEqual(texts);
    },
  );

  it('refuses errors that are not positive', () => {
    expect(() => latexMeasurement(1, 0, 1)).toThrow(RangeError);
  });
});
