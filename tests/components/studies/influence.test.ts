import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { nearestPoint } from '@/components/charts/chart-readout';
import { StarInfluenceChart } from '@/components/charts/star-influence-chart';
import {
  countLeaving,
  halfInWords,
  isStrong,
} from '@/components/studies/influence/influence-words';
import { LeftOutTable } from '@/components/studies/influence/left-out-table';
import { buildInfluence } from './check-fixtures';

describe('StarInfluenceChart', () => {
  it('draws a dot a star, rings hosts, and says what moves most', () => {
    const result = buildInfluence();
    const markup = renderToStaticMarkup(
      createElement(StarInfluenceChart, {
        stars: result.stars.map(({ without, ...star }) => ({
          ...star,
          limitWithout: without.limit,
          ratio: without.ratio,
        })),
        limit: result.limit,
        halfCarriedBy: result.halfCarriedBy,
        quantity: 'host_fraction',
        levelLabel: '95\u2009%',
      }),
    );
    expect(markup.match(/class="star-dot"/g)).toHaveLength(60);
    expect(markup.match(/class="ring"/g)).toHaveLength(1);
    expect(markup).toContain('hosts NTY 1024+0447 b');
    expect(markup).toContain('most moved without NTY 1234: below 4.3 per cent');
    expect(markup).toContain('14 stars to the right');
  });
});

describe('nearestPoint', () => {
  it('goes by distance in both directions', () => {
    const points = [
      { x: 0, y: 0 },
      { x: 10, y: 100 },
      { x: 12, y: 0 },
    ];
    expect(nearestPoint(points, 9, 20)).toBe(2);
    expect(nearestPoint(points, 9, 80)).toBe(1);
    expect(nearestPoint([], 1, 1)).toBeUndefined();
  });
});

describe('what is left without some stars', () => {
  it('is marked where it moves the limit by more than a fifth, up or down', () => {
    expect([1.19, 1.21, 0.81, 0.79].map(isStrong)).toEqual([false, true, false, true]);
    const { surveys, limit } = buildInfluence();
    const markup = renderToStaticMarkup(
      createElement(LeftOutTable, {
        caption: 'Limit without each survey',
        head: 'survey',
        rows: surveys.map((row) => ({ key: row.id, ...row })),
        limit,
        quantity: 'host_fraction',
        levelLabel: '95\u2009%',
      }),
    );
    expect(markup.match(/moves the limit by more than 20 per cent/g)).toHaveLength(1);
    expect(markup).toContain('+2.4 points');
  });

  it('counts only the stars that no other survey saw', () => {
    const stars = [['a'], ['a', 'b'], ['b'], ['a']].map((surveys) => ({ surveys }));
    expect(['a', 'b', 'c'].map((id) => countLeaving(stars, id))).toEqual([2, 1, 0]);
  });

  it('says in a sentence how many stars carry half', () => {
    expect(halfInWords(buildInfluence())).toBe(
      '14 stars carry half of the sensitivity, out of 60.',
    );
  });
});
