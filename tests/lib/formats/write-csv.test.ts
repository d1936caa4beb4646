import { describe, expect, it } from 'vitest';
import { writeCsv } from '@/lib/formats';

describe('writeCsv(columns)', () => {
  it('quotes commas, quotation marks, line breaks and #', () => {
    const values = ['plain', 'a,b', 'say "x"', 'two\nlines', 'run #7', '', null];
    expect(
      writeCsv([
        { name: 'name', values },
        { name: 'n', values: values.map((_, i) => i) },
      ]),
    ).toBe('name,n\nplain,0\n"a,b",1\n"say ""x""",2\n"two\nlines",3\n"run #7",4\n,5\n,6\n');
  });

  it('writes numbers in shortest form, with the sign of zero, and NaN as missing', () => {
    const values = [0.1 + 0.2, 1e21, 5e-324, -0, Number.NaN, 100];
    expect(
      writeCsv([
        { name: 'x', values },
        { name: 'y', values: values.map(() => true) },
      ]),
    ).toBe('x,y\n0.30000000000000004,true\n1e+21,true\n5e-324,true\n-0,true\n,true\n100,true\n');
  });

  it('refuses infinite numbers and columns of unequal length', () => {
    expect(() => writeCsv([{ name: 'x', values: [Number.POSITIVE_INFINITY] }])).toThrow(RangeError);
    expect(() =>
      writeCsv([
        { name: 'x', values: [1] },
        { name: 'y', values: [] },
      ]),
    ).toThrow('column y must have 1 values, got 0');
  });

  it('guards formulas in notes and nowhere else', () => {
    const values = ['=1+2', '-x', '@y', "'=z", 'fine'];
    expect(writeCsv([{ name: 'notes', values }])).toBe("notes\n'=1+2\n'-x\n'@y\n''=z\nfine\n");
    expect(writeCsv([{ name: 'value', values: ['-3'] }])).toBe('value\n-3\n');
  });
});
