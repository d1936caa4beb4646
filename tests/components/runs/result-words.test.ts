import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { savedWords } from '@/components/charts/posterior-words';
import { LevelTable } from '@/components/runs/level-table';

const curve = {
  rate: Float64Array.of(0, 1),
  density: Float64Array.of(1, 1),
  cumulative: Float64Array.of(0, 1),
};

describe('the saved limit beside a live one', () => {
  it('carries its own level, and says when more than the level differs', () => {
    const saved = { curve, limit: 0.058, credibleLevel: 0.95 };
    const words = (hasOtherSettings: boolean) =>
      savedWords({ ...saved, hasOtherSettings }, 'host_fraction');
    expect(words(false)).toBe('saved <5.8\u2009% (95\u2009%)');
    expect(words(true)).toBe('saved <5.8\u2009% (95\u2009%), other settings');
  });
});

describe('LevelTable', () => {
  const table = (hostFraction: number) =>
    renderToStaticMarkup(
      createElement(LevelTable, {
        levels: [
          {
            ...{ level: 0.95, hostFraction, meanNumber: hostFraction },
            ...{ hostFractionZero: 0.026, meanNumberZero: 0.026 },
          },
        ],
        credibleLevel: 0.95,
        quantity: 'host_fraction' as const,
        detections: 0,
        foot: '',
      }),
    );
  const groups = (markup: string) => markup.match(/scope="colgroup"/g)?.length;

  it('shows one group where nothing counts', () => {
    expect(groups(table(0.026))).toBe(1);
  });

  it('keeps both where candidates count without a detection', () => {
    expect(groups(table(0.031))).toBe(2);
  });
});
