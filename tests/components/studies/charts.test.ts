import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { stepTo } from '@/components/charts/chart-readout';
import { cornerCells } from '@/components/charts/corner-chart';
import { CountsChart, countsShown } from '@/components/charts/counts-chart';
import { EvidenceChart } from '@/components/charts/evidence-chart';
import { wrapLine } from '@/components/charts/export-drawing';
import { densityAtShares, type JointPlane } from '@/components/charts/joint-contours';
import { limitBands } from '@/components/charts/limit-bands';
import {
  type FieldAxis,
  fieldTables,
  LimitFieldChart,
} from '@/components/charts/limit-field-chart';
import {
  LimitSweepChart,
  stepPlaces,
  steppedCurve,
  stepsOf,
} from '@/components/charts/limit-sweep-chart';
import { RuleIntervalsChart } from '@/components/charts/rule-intervals-chart';
import { textWidth } from '@/components/charts/text-width';
import {
  evidenceInWords,
  evidenceSteps,
} from '@/components/studies/population-comparison/comparison-words';
import { sweepAxis } from '@/components/studies/sweep/sweep-parameters';
import {
  buildComparison,
  buildCounts,
  buildFreeIndices,
  buildLimitMap,
  buildOverlaps,
  buildSweep,
} from './fixtures';

const labelOf = (markup: string) => /role="img" aria-label="([^"]*)"/.exec(markup)?.[1] ?? '';
const axis = (at: number[], plainName: string, unit: string): FieldAxis => ({
  at,
  isLog: true,
  name: plainName,
  plainName,
  say: (value) => `${value} ${unit}`,
});

describe('LimitFieldChart', () => {
  const result = buildLimitMap();
  const props = {
    x: axis(result.semiMajorAxisAu, 'semi-major axis', 'AU'),
    y: axis(result.massMjup, 'planet mass', 'MJ'),
    limit: result.limit,
    isSetByPrior: result.isSetByPrior,
    quantity: 'host_fraction' as const,
    levelLabel: '95 %',
    subject: 'Upper limit',
    detections: [{ name: 'NTY 1 b', massMjup: 9, semiMajorAxisAu: 60 }],
  };

  it('names the strongest limit, its place, the part set by the prior and the detections', () => {
    const label = labelOf(renderToStaticMarkup(createElement(LimitFieldChart, props)));
    expect(label).toContain('strongest below 1.2 per cent of stars at 50 MJ');
    expect(label).toMatch(/set by the prior at \d+ per cent of the places/);
    expect(label).toContain('NTY 1 b');
  });

  it('draws contours at round limits with their number, and hatches where the prior rules', () => {
    const markup = renderToStaticMarkup(createElement(LimitFieldChart, props));
    for (const percent of [2, 5, 10, 20, 50]) expect(markup).toContain(`>${percent}\u2009%</text>`);
    expect(markup).toContain('-hatch)');
    expect(markup).not.toMatch(/NaN/);
  });

  it('is read by keyboard at each node, highest mass upwards', () => {
    const markup = renderToStaticMarkup(createElement(LimitFieldChart, props));
    expect(markup).toContain('role="slider"');
    expect(markup).toMatch(/aria-valuetext="&lt;[\d.]+\u2009% \(95 %\), /);
    const rowsPx = [300, 200, 100];
    expect(stepTo('ArrowUp', 1, { column: 0, row: 0 }, 9, rowsPx)).toEqual({ column: 0, row: 1 });
    expect(stepTo('ArrowDown', 1, { column: 0, row: 0 }, 9, rowsPx)?.row).toBe(0);
    expect(stepTo('ArrowRight', 10, { column: 4, row: 0 }, 9, rowsPx)?.column).toBe(8);
    expect(stepTo('Tab', 1, { column: 4, row: 0 }, 9, rowsPx)).toBeUndefined();
  });

  it('says in its table where the prior sets the limit and where there is none', () => {
    const [table] = fieldTables({
      ...props,
      limit: props.limit.map((row) => row.map((_, i) => (i === 0 ? null : row[i]))),
    });
    expect(table.rows[0][0]).toBe('50 MJ');
    expect(table.rows.every((row) => row[1] === '–')).toBe(true);
    expect(table.rows.flat().some((cell) => cell.endsWith(' p'))).toBe(true);
  });
});

describe('limitBands', () => {
  it('goes deeper with a stronger limit and carries the round contours', () => {
    const bands = limitBands(0.004, 0.95);
    expect(bands.contours).toEqual([0.01, 0.02, 0.05, 0.1, 0.2, 0.5]);
    for (let i = 1; i < bands.limits.length; i += 1) {
      expect(bands.limits[i]).toBeLessThan(bands.limits[i - 1]);
      expect(bands.ramp[i]).toBeGreaterThan(bands.ramp[i - 1]);
    }
    expect(bands.ramp.at(-1)).toBeLessThanOrEqual(19);
  });

  it('takes finer steps where limits differ by little', () => {
    expect(limitBands(0.05, 0.09).contours).toEqual([0.08, 0.07, 0.06]);
  });
});

describe('a companion that enters a range between two values', () => {
  const at = [100, 110, 121];

  it('makes a jump where it lies', () => {
    const places = stepPlaces(at, [0, 0, 1], [40, 118]);
    expect([...places]).toEqual([[1, 118]]);
    expect(steppedCurve(at, [2, 3, 5], places)).toEqual({
      at: [100, 110, 118, 118, 121],
      values: [2, 3, 3, 5, 5],
    });
  });

  it('is left as a slope where its place is not known, or is one of two', () => {
    expect(stepPlaces(at, [0, 0, 1], []).size).toBe(0);
    expect(stepPlaces(at, [0, 0, 1], [112, 118]).size).toBe(0);
    expect(steppedCurve(at, [2, 3, 5], new Map())).toEqual({ at, values: [2, 3, 5] });
  });
});

describe('LimitSweepChart', () => {
  const result = buildSweep();
  const props = {
    x: sweepAxis('semi-major-axis-max', result.value),
    ...result,
    here: { x: 300, limit: 0.0576 },
    quantity: 'host_fraction' as const,
    levelLabel: '95 %',
  };

  it('draws both curves, the run and the steps of the detections', () => {
    const markup = renderToStaticMarkup(createElement(LimitSweepChart, props));
    expect(markup).toContain('this run: &lt;5.8\u2009%');
    expect(markup).toContain('with no detection');
    expect(markup).toContain('>1 detection</text>');
    expect(markup).toContain('set by the prior');
    expect(labelOf(markup)).toContain('at 30 AU');
    expect(markup).not.toMatch(/NaN/);
  });

  it('leaves out what is not there: no detection, no run inside', () => {
    const markup = renderToStaticMarkup(
      createElement(LimitSweepChart, {
        ...props,
        limit: props.limitZero,
        detections: props.detections.map(() => 0),
        here: { x: 5000, limit: 1 },
      }),
    );
    expect(markup).not.toContain('with no detection');
    expect(markup).not.toContain('this run: &lt;');
  });

  it('finds the stretches of equal counts', () => {
    expect(stepsOf([0, 0, 2, 1])).toEqual([
      { from: 0, to: 1, count: 0 },
      { from: 2, to: 2, count: 2 },
      { from: 3, to: 3, count: 1 },
    ]);
  });
});

describe('corner chart', () => {
  it('holds 68 and 95 per cent of a bell of two parameters inside its areas', () => {
    // Inside the density exp(−r²/2) of its top lies the share 1 − exp(−r²/2).
    const at = Array.from({ length: 161 }, (_, i) => (i - 80) / 16);
    const bell: JointPlane = {
      x: at,
      y: at,
      density: at.map((y) => at.map((x) => Math.exp(-(x * x + y * y) / 2))),
    };
    const [inner, outer] = densityAtShares(bell, [0.68, 0.95]);
    expect(inner).toBeCloseTo(0.32, 2);
    expect(outer).toBeCloseTo(0.05, 2);
    const skewed = buildFreeIndices().rateByMassIndex;
    const levels = densityAtShares(skewed, [0.68, 0.95]);
    expect(levels[0]).toBeGreaterThan(levels[1]);
  });

  it('lays its six cells beside each other without overlap', () => {
    for (const [width, height] of [
      [820, 672],
      [340, 400],
    ]) {
      const cells = cornerCells(width, height);
      expect(cells).toHaveLength(6);
      for (const cell of cells) {
        expect(cell.right).toBeLessThanOrEqual(width);
        expect(cell.bottom).toBeLessThanOrEqual(height - 40);
        const right = cells.find((it) => it.row === cell.row && it.column === cell.column + 1);
        if (right) expect(right.left).toBeGreaterThan(cell.right);
      }
    }
  });
});

describe('CountsChart', () => {
  it('always shows the counted number, however unlikely', () => {
    expect(countsShown([0.9, 0.1], [0.8, 0.2], 7)).toBe(8);
    expect(countsShown([0.5, 0.3, 0.19, 0.01, 1e-9], [1, 0, 0, 0, 0], 0)).toBe(4);
    const result = buildCounts();
    const markup = renderToStaticMarkup(
      createElement(CountsChart, { ...result, rateLabel: 'at a host fraction of 2.5 %' }),
    );
    expect(markup).toContain('counted: ');
    expect(labelOf(markup)).toContain('counted: 2, with probability 24');
  });
});

describe('EvidenceChart', () => {
  const rows = buildComparison().rows.map((row) => ({ ...row, key: row.key }));

  it('says which population has none, and draws no dot for it', () => {
    const markup = renderToStaticMarkup(
      createElement(EvidenceChart, { rows, steps: evidenceSteps }),
    );
    expect(labelOf(markup)).toContain('Close in only none');
    expect(labelOf(markup)).toContain('Flat in both −3.92');
    expect(markup.match(/<circle/g)).toHaveLength(3);
  });

  it('uses the words of Kass & Raftery (1995): 2 ln B of 2, 6 and 10', () => {
    expect(evidenceInWords(0.99)).toBe('not worth more than a bare mention');
    expect(evidenceInWords(1)).toBe('positive evidence for it');
    expect(evidenceInWords(-3)).toBe('strong evidence against it');
    expect(evidenceInWords(5)).toBe('very strong evidence for it');
  });
});

describe('RuleIntervalsChart', () => {
  it('draws the bracket, marks the rule of the run, and leaves a refused rule without a bar', () => {
    const { rules, bracket } = buildOverlaps();
    const markup = renderToStaticMarkup(
      createElement(RuleIntervalsChart, {
        rows: rules.map((one) => ({
          ...one,
          key: one.rule,
          name: one.rule,
          isUsed: one.rule === 'same-position',
        })),
        bracket,
        quantity: 'host_fraction',
        levelLabel: '95 %',
      }),
    );
    expect(markup).toContain('whatever the correlation: 5.5–5.9\u2009%');
    expect(markup.match(/class="bar"/g)).toHaveLength(1);
    expect(markup.match(/class="bar-open"/g)).toHaveLength(2);
    expect(labelOf(markup)).toContain('refuse none');
  });
});

describe('captions of exported figures', () => {
  it('keep every word and the width', () => {
    const text = buildComparison().notes.join(' ').repeat(6);
    const lines = wrapLine(text, 300, 13);
    expect(lines.join(' ')).toBe(text);
    for (const line of lines) expect(textWidth(line, 13)).toBeLessThanOrEqual(300);
  });
});
