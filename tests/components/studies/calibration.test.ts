import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { binomialBand } from '@/components/charts/binomial-band';
import { CoverageChart, shareWithError } from '@/components/charts/coverage-chart';
import { evenBins, RankHistogramChart } from '@/components/charts/rank-histogram-chart';
import {
  checkInWords,
  newestCalibration,
} from '@/components/studies/calibration/calibration-check';
import {
  biasInWords,
  percentages,
  readPercentages,
} from '@/components/studies/calibration/calibration-words';
import type { StudySummary } from '@/lib/schemas/studies';
import { buildCalibration } from './check-fixtures';

describe('binomialBand', () => {
  it('leaves out tails that can be counted by hand', () => {
    // Four tosses: 1, 4, 6, 4, 1 of 16.
    expect(binomialBand(4, 0.5, 0.8)).toEqual([1, 3]);
    expect(binomialBand(4, 0.5, 0.9)).toEqual([0, 4]);
    // Three trials of a third: none with 8/27, all with 1/27.
    expect(binomialBand(3, 1 / 3, 0.9)).toEqual([0, 2]);
  });

  it('is close to the normal band for many surveys', () => {
    const [low, high] = binomialBand(20_000, 0.05, 0.999);
    // 3.2905: the normal quantile at 0.9995 (Abramowitz and Stegun 1964, table 26.6, from memory).
    const spread = 3.2905 * Math.sqrt(20_000 * 0.05 * 0.95);
    expect(Math.abs(1000 - low - spread)).toBeLessThan(4);
    expect(Math.abs(high - 1000 - spread)).toBeLessThan(4);
  });
});

describe('calibration in charts', () => {
  it('puts each observed coverage beside what theory predicts', () => {
    const { coverage, surveys } = buildCalibration();
    const markup = renderToStaticMarkup(
      createElement(CoverageChart, {
        points: coverage.map((row) => ({ ...row, x: row.level })),
        xName: 'credible level',
        xUnit: '\u2009%',
        subject: `Coverage of upper limits in ${surveys} invented surveys`,
      }),
    );
    expect(markup).toContain('95 per cent: held in 95.1\u2009%, expected 95.0\u2009%');
    expect(markup.match(/class="tolerance"/g)).toHaveLength(coverage.length);
    expect(markup.match(/class="error-bar"/g)).toHaveLength(2 * coverage.length);
  });

  it('says how many bins leave the band', () => {
    const { bins } = buildCalibration().ranks;
    expect(evenBins(bins).outside).toBe(0);
    const leaning = bins.map((count, i) => (i === 0 ? count + 60 : i === 19 ? count - 40 : count));
    const markup = renderToStaticMarkup(
      createElement(RankHistogramChart, { bins: leaning, draws: 99 }),
    );
    expect(markup).toContain('2 bins lie outside');
  });

  it('gives shares the digits that their errors allow', () => {
    expect(shareWithError(0.9512, 0.0069)).toBe('95.1 ± 0.7\u2009%');
    expect(shareWithError(0.5, 0.016)).toBe('50 ± 2\u2009%');
  });
});

describe('settings of a calibration', () => {
  it('reads percentages as they are typed, and leaves words to the schema', () => {
    expect(readPercentages('50, 68 %; 99.7')).toEqual([0.5, 0.68, 0.997]);
    expect(readPercentages('half')).toEqual(['half']);
    expect(readPercentages(percentages([0.683, 0.95, 0.997]))).toEqual([0.683, 0.95, 0.997]);
  });
});

describe('the check beside a limit', () => {
  const study = (number: number, status: string, kind = 'calibration') =>
    ({ number, settings: { kind }, job: { status } }) as unknown as StudySummary;

  it('takes the newest answer, then what is on its way, and never what failed', () => {
    const all = [study(5, 'failed'), study(4, 'running'), study(3, 'done'), study(2, 'done')];
    expect(newestCalibration(all)?.number).toBe(3);
    expect(newestCalibration(all.slice(0, 2))?.number).toBe(4);
    expect(newestCalibration([study(5, 'failed'), study(6, 'done', 'sweep')])).toBeUndefined();
  });

  it('speaks of the run’s own level, or of the highest that was tried', () => {
    const { coverage } = buildCalibration();
    expect(checkInWords(coverage, 1000, 0.9)).toBe(
      '90\u2009% limits lay above the truth in 90.6\u2009% of 1000 invented surveys',
    );
    expect(checkInWords(coverage, 1000, 0.99)).toContain('95\u2009% limits');
  });

  it('gives the bias of the median its sign and its error', () => {
    const { medianBias } = buildCalibration();
    expect(biasInWords(medianBias, 'host_fraction')).toBe('+0.11 ± 0.21 points');
    expect(biasInWords({ ...medianBias, mean: -0.02 }, 'companions_per_star')).toBe(
      '−2.0 ± 0.21 per 100 stars',
    );
  });
});
