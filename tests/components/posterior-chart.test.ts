import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { ChartTables } from '@/components/charts/chart-figure';
import { PosteriorChart } from '@/components/charts/posterior-chart';
import { densityTop } from '@/components/charts/posterior-layout';
import {
  formatLevel,
  type PosteriorData,
  posteriorSentence,
  posteriorTables,
} from '@/components/charts/posterior-words';
import { rateAxisMax, samplePrior, sampleRateCurve } from '@/components/charts/rate-curve';
import { equalTailedInterval, ratePosterior, upperLimit } from '@/lib/inference';

const completeness = Float64Array.from({ length: 120 }, (_, star) => 0.15 + (0.6 * star) / 120);

function buildPosterior(detectedStars: number[]) {
  const posterior = ratePosterior({
    likelihood: 'host-fraction',
    completeness,
    detectedStars,
    prior: { law: 'uniform', max: 1 },
  });
  return { posterior, limit: upperLimit(posterior, 0.95) };
}

function buildData(): PosteriorData {
  const { posterior, limit } = buildPosterior([3, 77]);
  const none = buildPosterior([]);
  const max = rateAxisMax([limit], posterior.support[1]);
  const curve = sampleRateCurve(posterior, max);
  return {
    curve,
    limit,
    credibleLevel: 0.95,
    quantity: 'host_fraction',
    median: posterior.median,
    interval68: equalTailedInterval(posterior, 0.68),
    prior: { density: samplePrior(posterior, curve.rate), label: 'uniform in f from 0 to 1' },
    alternative: {
      label: 'same run with zero detections',
      curve: sampleRateCurve(none.posterior, max),
      limit: none.limit,
    },
  };
}

describe('PosteriorChart', () => {
  const data = buildData();
  const limitWords = `${(100 * data.limit).toPrecision(2)}\u2009%`;

  it('states limit and level in its label, on the flag and in its table', () => {
    const markup = renderToStaticMarkup(createElement(PosteriorChart, data));
    const label = /aria-label="([^"]*)"/.exec(markup)?.[1];
    expect(label).toContain(`upper limit &lt;${limitWords} (95\u2009%)`);
    expect(label).toContain('prior: uniform in f from 0 to 1');
    expect(markup).toMatch(
      new RegExp(`class="flag-text"[^>]*>&lt;${limitWords} \\(95\u2009%\\)</text>`),
    );
    const table = renderToStaticMarkup(
      createElement(ChartTables, { tables: posteriorTables(data) }),
    );
    expect(table).toContain(`upper limit (95\u2009%)</th>`);
    expect(table).toContain(`&lt;${limitWords}</td>`);
  });

  it('names the curve with zero detections and gives its own limit', () => {
    expect(posteriorSentence(data)).toContain('same run with zero detections: <');
    const markup = renderToStaticMarkup(createElement(PosteriorChart, data));
    expect(markup).toContain('same run with zero detections</text>');
  });

  it('says which share of the probability the hatching holds', () => {
    const at90 = renderToStaticMarkup(
      createElement(PosteriorChart, { ...data, credibleLevel: 0.9 }),
    );
    expect(at90).toContain('10\u2009% of the probability');
  });

  it('draws both bounds when two analyses share an axis, one of them outlined', () => {
    const { alternative, ...first } = data;
    const markup = renderToStaticMarkup(
      createElement(PosteriorChart, {
        ...first,
        name: 'A',
        second: { name: 'B', ...(alternative as NonNullable<typeof alternative>) },
      }),
    );
    expect(markup.match(/class="bar"/g)).toHaveLength(1);
    expect(markup.match(/class="bar-open"/g)).toHaveLength(1);
  });

  it('replaces the tail by the level in the cumulative view', () => {
    const markup = renderToStaticMarkup(
      createElement(PosteriorChart, { ...data, view: 'cumulative' }),
    );
    expect(markup).not.toContain('of the probability');
    expect(markup).toContain(`>95\u2009%</text>`);
  });

  it('keeps a density that has no end at zero inside the frame', () => {
    const posterior = ratePosterior({
      likelihood: 'mean-number',
      completeness,
      detectedStars: [],
      prior: { law: 'jeffreys' },
    });
    const curve = sampleRateCurve(posterior, 0.1);
    const highest = Math.max(...curve.density);
    expect(densityTop({ curve })).toBeLessThan(highest / 2);
    expect(curve.density.every(Number.isFinite)).toBe(true);
  });
});

describe('formatLevel', () => {
  it.each([
    [0.95, '95\u2009%'],
    [0.9, '90\u2009%'],
    [0.997, '99.7\u2009%'],
    [0.5, '50\u2009%'],
  ])('writes %s as %s', (level, words) => {
    expect(formatLevel(level)).toBe(words);
  });
});
