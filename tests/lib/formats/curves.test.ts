import { describe, expect, it } from 'vitest';
import { faultsOf, notesOf, readText, recordsOf } from './read-text';

const header = 'target,separation [arcsec],contrast [mag],band,epoch';

describe('readCurves(table)', () => {
  it('converts flux ratios to magnitudes and milliarcseconds to arcseconds', () => {
    const text =
      'target,separation [mas],contrast [1],band\nA,200,1e-4,K\nA,500,1e-5,K\nA,900,1,K\n';
    const [curve] = recordsOf('contrast-curves', text).records;
    expect(curve.separationArcsec).toEqual([0.2, 0.5, 0.9]);
    expect(curve.contrastMag[0]).toBeCloseTo(10, 12);
    expect(curve.contrastMag[1]).toBeCloseTo(12.5, 12);
    expect(curve.contrastMag[2]).toBe(0);
  });

  it('splits curves by star, band, epoch and instrument, and sorts each', () => {
    const text = `${header},instrument
A,0.5,10,K,2014-05-01,X
A,0.2,7,K,2014-05-01,X
A,0.2,6,J,2014-05-01,X
A,0.5,9,J,2014-05-01,X
a,0.2,6,K,56778.5,X
A,0.5,9,K,56778.5,X
`;
    const { records, notes } = recordsOf('contrast-curves', text);
    expect(
      records.map((c) => [c.target, c.band, c.epoch, c.separationArcsec, c.contrastMag]),
    ).toEqual([
      ['A', 'K', '2014-05-01', [0.2, 0.5], [7, 10]],
      ['A', 'J', '2014-05-01', [0.2, 0.5], [6, 9]],
      ['A', 'K', '56778.5', [0.2, 0.5], [6, 9]],
    ]);
    expect(notesOf(notes, 'warning')).toEqual(['axis-order at target "A"']);
  });

  it('reads a two-column file for the star and band that the form names', () => {
    const text = 'separation,contrast\n0.2,7\n0.5,10\n';
    const { records } = recordsOf('contrast-curves', text, {
      defaultTarget: 'RB 1',
      defaultBand: 'K',
    });
    expect(records[0]).toMatchObject({ target: 'RB 1', band: 'K', contrastMag: [7, 10] });
    expect(faultsOf('contrast-curves', text, { defaultBand: 'K' })).toEqual([
      'column-missing at line 1',
    ]);
    expect(faultsOf('contrast-curves', text, { defaultTarget: 'RB 1' })).toEqual([
      'column-missing at line 1',
    ]);
  });

  it('takes the survey’s spelling of a target, from its name or another name', () => {
    const targetNames = [{ name: 'RB 0001', otherNames: ['HIP 7'] }];
    const text = 'target,separation,contrast,band\nhip7,0.2,7,K\nrb 0001,0.5,10,K\n';
    const { records } = recordsOf('contrast-curves', text, { targetNames });
    expect(records).toHaveLength(1);
    expect(records[0].target).toBe('RB 0001');
  });

  it('suggests the target that was meant, once for all its rows', () => {
    const text = 'target,separation,contrast,band\nRB 0010,0.2,7,K\nRB 0010,0.5,10,K\n';
    const result = readText('contrast-curves', text, {
      targetNames: [{ name: 'RB 0001', otherNames: [] }],
    });
    if (result.ok) throw new Error('accepted');
    expect(result.faults).toHaveLength(1);
    expect(result.faults[0].hint).toContain('Did you mean "RB 0001"?');
  });

  it.each([
    ['A,0.2,7,K,2014-5-1', 'date-invalid at line 2, column "epoch"'],
    ['A,0.2,7,K,2014', 'date-invalid at line 2, column "epoch"'],
    ['A,0.2,7,K,20140501', 'date-invalid at line 2, column "epoch"'],
    ['A,0.2,7,,2014-05-01', 'value-missing at line 2, column "band"'],
    ['A,,7,K,2014-05-01', 'value-missing at line 2, column "separation"'],
    ['A,0.2,-1,K,2014-05-01', 'out-of-range at line 2, column "contrast"'],
    [',0.2,1,K,2014-05-01', 'value-missing at line 2, column "target"'],
  ])('refuses %s', (row, fault) => {
    expect(faultsOf('contrast-curves', `${header}\n${row}\n`)[0]).toBe(fault);
  });

  it('counts a repeated row once and refuses settings that change along a curve', () => {
    const repeated = recordsOf(
      'contrast-curves',
      `${header}\nA,0.2,7,K,\nA,0.5,9,K,\nA,0.5,9,K,\n`,
    );
    expect(repeated.records[0].separationArcsec).toEqual([0.2, 0.5]);
    expect(notesOf(repeated.notes, 'information')).toContain('row-repeated at line 4');
    const text = 'target,separation,contrast,band,n_sigma\nA,0.2,7,K,5\nA,0.5,9,K,3\n';
    expect(faultsOf('contrast-curves', text)).toEqual(['inconsistent at line 3, column "n_sigma"']);
  });

  it('keeps coverage, taking gaps as 1', () => {
    const text = 'target,separation,contrast,band,coverage [%]\nA,0.2,7,K,50\nA,0.5,9,K,\n';
    expect(recordsOf('contrast-curves', text).records[0].coverage).toEqual([0.5, 1]);
  });
});
