import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { spreadNames } from '@/components/charts/end-names';
import { StarCurvesChart } from '@/components/charts/star-curves-chart';

const curve = (name: string, seriesIndex: number, deepest: number) => ({
  name,
  seriesIndex,
  separationArcsec: Float64Array.of(0.1, 1, 5),
  contrastMag: Float64Array.of(6, deepest - 1, deepest),
});

describe('the curves of one star', () => {
  it('are named in the colours of their surveys, and no median stands among them', () => {
    const curves = [
      curve('HALYARD H', 0, 14),
      curve('PETREL K', 1, 14.1),
      curve('SANDBAR L', 2, 12),
    ];
    const markup = renderToStaticMarkup(createElement(StarCurvesChart, { curves, nSigma: 5 }));
    for (const [i, { name }] of curves.entries()) {
      expect(markup).toContain(`>${name}</text>`);
      expect(markup).toContain(`stroke:var(--s${i + 1})`);
    }
    expect(markup).not.toContain('median');
  });

  it('end at names that lie on each other nowhere and leave the drawing nowhere', () => {
    const placed = spreadNames([250, 249, 20, 248], { top: 26, bottom: 254 });
    const sorted = [...placed].sort((a, b) => a - b);
    for (let i = 1; i < sorted.length; i += 1)
      expect(sorted[i] - sorted[i - 1]).toBeGreaterThanOrEqual(16);
    expect(sorted.at(-1)).toBeLessThanOrEqual(254);
    expect(placed[2]).toBe(26);
  });
});
