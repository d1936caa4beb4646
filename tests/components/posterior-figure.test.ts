import { describe, expect, it } from 'vitest';
import { posteriorFigureSvg } from '@/components/charts/figure/posterior-figure';
import { rateAxisMax, samplePrior, sampleRateCurve } from '@/components/charts/rate-curve';
import { equalTailedInterval, ratePosterior, upperLimit } from '@/lib/inference';

function buildFigure(overrides: Partial<Parameters<typeof posteriorFigureSvg>[0]> = {}): string {
  const posterior = ratePosterior({
    likelihood: 'host-fraction',
    completeness: Float64Array.from({ length: 80 }, () => 0.4),
    detectedStars: [2],
    prior: { law: 'uniform', max: 1 },
  });
  const limit = upperLimit(posterior, 0.95);
  const curve = sampleRateCurve(posterior, rateAxisMax([limit], 1));
  return posteriorFigureSvg({
    curve,
    limit,
    credibleLevel: 0.95,
    quantity: 'host_fraction',
    median: posterior.median,
    interval68: equalTailedInterval(posterior, 0.68),
    prior: { label: 'uniform in f from 0 to 1', density: samplePrior(posterior, curve.rate) },
    caption: 'Planets of 2–30 Mjup at 20–300 AU around 80 stars & 1 detection; run 18, 9d37',
    title: 'Posterior of the host fraction <f>',
    description: 'Upper limit with its conditions',
    widthMm: 88,
    ...overrides,
  });
}

/** Words of all text elements, as a reader sees them. */
function words(svg: string): string {
  return [...svg.matchAll(/<text[^>]*>([^<]*)<\/text>/g)].map((match) => match[1]).join(' ');
}

describe('posteriorFigureSvg', () => {
  it('stands alone: no variable, style, script, reference or foreign object', () => {
    const svg = buildFigure();
    expect(svg).not.toMatch(/var\(|currentColor|foreignObject|<script|<style|class=|href|url\(/i);
    const colours = new Set([...svg.matchAll(/(?:fill|stroke)="([^"]*)"/g)].map((it) => it[1]));
    for (const colour of colours) expect(colour).toMatch(/^(#[0-9a-f]{6}|none)$/);
  });

  it('carries level, prior, ranges and what the caption adds', () => {
    const said = words(buildFigure());
    expect(said).toMatch(/&lt;\d+(\.\d)?\u2009% \(95\u2009%\)/);
    expect(said).toContain('prior: uniform in f from 0 to 1');
    expect(said).toContain('2–30 Mjup at 20–300 AU');
    expect(said).toContain('80 stars &amp; 1 detection');
    expect(said).toContain('run 18, 9d37.');
  });

  it('says draft when it is one, and not otherwise', () => {
    expect(words(buildFigure({ standing: 'draft, run 18' }))).toContain('draft, run 18');
    expect(words(buildFigure())).not.toContain('draft');
  });

  it('is as wide as a column or a page, and escapes its title', () => {
    expect(buildFigure()).toContain('width="88mm"');
    expect(buildFigure({ widthMm: 180 })).toContain('width="180mm"');
    expect(buildFigure()).toContain('<title>Posterior of the host fraction &lt;f&gt;</title>');
  });

  it('gives the same bytes for the same inputs', () => {
    expect(buildFigure()).toBe(buildFigure());
  });

  it('keeps every coordinate inside the drawing', () => {
    const svg = buildFigure();
    const [, width, height] = /viewBox="0 0 ([\d.]+) ([\d.]+)"/.exec(svg) ?? [];
    for (const [, path] of svg.matchAll(/<path d="([^"]*)"/g)) {
      expect(path).not.toMatch(/NaN|Infinity/);
      for (const [, x, y] of path.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)) {
        expect(Number(x)).toBeGreaterThanOrEqual(0);
        expect(Number(x)).toBeLessThanOrEqual(Number(width));
        expect(Number(y)).toBeLessThanOrEqual(Number(height));
      }
    }
  });
});
