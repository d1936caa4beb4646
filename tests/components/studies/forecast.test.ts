import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { LimitByStarsChart } from '@/components/charts/limit-by-stars-chart';
import { atLeastEach, YieldChart } from '@/components/charts/yield-chart';
import {
  addRow,
  draftOfForecast,
  pasteCells,
  readForecast,
  removeRow,
  targetGrid,
  targetKey,
} from '@/components/studies/forecast/forecast-draft';
import { neededInWords, plannedInWords } from '@/components/studies/forecast/forecast-words';
import { forecastSettingsSchema } from '@/lib/schemas/study-settings';
import { buildForecast } from './check-fixtures';

const likeThese = forecastSettingsSchema.parse({
  kind: 'forecast',
  name: 'Deeper CURLEW',
  planned: { kind: 'stars-like-these', count: 120, deeperByMag: 1 },
  assumedRate: 0.025,
  wantedLimit: 0.029,
});
const list = forecastSettingsSchema.parse({
  kind: 'forecast',
  name: 'Two stars',
  planned: {
    kind: 'targets',
    targets: [
      { name: 'NTY 1', distancePc: 31.4, distanceErrorPc: 0.2, ageMyr: 24, hostMag: 5.125 },
      {
        name: 'NTY 2',
        distancePc: 18,
        ageMyr: 140,
        ageLowerMyr: 110,
        ageUpperMyr: 180,
        hostMag: 7,
        hostMassMsun: 0.8,
      },
    ],
    curve: { band: 'H', separationArcsec: [0.2, 0.5, 1], contrastMag: [9, 12.5, 14] },
  },
});

describe('fields of a forecast', () => {
  it('give back the settings that they were filled from', () => {
    for (const settings of [likeThese, list]) {
      const read = forecastSettingsSchema.parse(readForecast(draftOfForecast(settings)));
      expect(read).toEqual(settings);
    }
  });

  it('leave what is no number for the schema to refuse by its place', () => {
    const draft = { ...draftOfForecast(list), [targetKey(1, 'ageMyr')]: 'young' };
    const { error } = forecastSettingsSchema.safeParse(readForecast(draft));
    expect(error?.issues.map(({ path }) => path.join('.'))).toEqual(['planned.targets.1.ageMyr']);
  });

  it('take the cells of a spreadsheet from one field on, with rows as needed', () => {
    const first = draftOfForecast(undefined);
    const pasted = 'NTY 7\t40\t0.1\t20\r\nNTY 8\t41\t0.1\t30\r\n';
    const next = pasteCells(first, [0, 0], pasted, targetGrid);
    expect(next?.targetRows).toBe('2');
    expect(next?.[targetKey(1, 'name')]).toBe('NTY 8');
    expect(next?.[targetKey(1, 'ageMyr')]).toBe('30');
    expect(pasteCells(first, [0, 0], 'NTY 7', targetGrid)).toBeUndefined();
  });

  it('move the rows below up when one is removed, and never lose the last', () => {
    const draft = removeRow(draftOfForecast(list), 0, targetGrid);
    expect(draft.targetRows).toBe('1');
    expect(draft[targetKey(0, 'name')]).toBe('NTY 2');
    expect(draft[targetKey(1, 'name')]).toBeUndefined();
    const emptied = removeRow(draft, 0, targetGrid);
    expect(emptied.targetRows).toBe('1');
    expect(emptied[targetKey(0, 'name')]).toBe('');
    expect(addRow(emptied, targetGrid).targetRows).toBe('2');
  });
});

describe('a forecast in charts', () => {
  const result = buildForecast();

  it('counts the chance of at least so many from the top', () => {
    const atLeast = atLeastEach([0.5, 0.3, 0.2]);
    expect(atLeast[0]).toBeCloseTo(1, 12);
    expect(atLeast[1]).toBeCloseTo(0.5, 12);
    expect(atLeast[2]).toBeCloseTo(0.2, 12);
  });

  it('is marked as a forecast in each drawing and its sentence', () => {
    const yieldMarkup = renderToStaticMarkup(
      createElement(YieldChart, {
        distribution: result.distribution,
        mean: result.yield.mean,
        interval68: result.yield.interval68,
        rateLabel: 'at a host fraction of 2.5\u2009%',
      }),
    );
    const limitMarkup = renderToStaticMarkup(
      createElement(LimitByStarsChart, {
        ...result.against,
        wanted: result.wantedLimit,
        starsNeeded: result.starsNeeded,
        quantity: 'host_fraction',
        levelLabel: '95\u2009%',
        rateLabel: 'at a host fraction of 2.5\u2009%',
      }),
    );
    for (const markup of [yieldMarkup, limitMarkup]) {
      expect(markup).toContain('aria-label="Forecast: ');
      expect(markup).toMatch(/<text[^>]*>forecast<\/text>/);
    }
    expect(yieldMarkup).toContain('chance of none 19\u2009%');
    expect(limitMarkup).toContain('reached with 268 stars');
    expect(limitMarkup).toContain('68 % of outcomes at a host fraction of 2.5');
  });

  it('says when no number of stars is enough', () => {
    expect(neededInWords(result, 'host_fraction')).toBe(
      '268 such stars would be needed for <2.9\u2009% by themselves, if nothing is found.',
    );
    expect(neededInWords({ ...result, starsNeeded: null }, 'host_fraction')).toContain(
      'No number of such stars',
    );
  });

  it('names what is planned', () => {
    expect(plannedInWords(likeThese)).toBe('120 stars like those of the run, curves 1 mag deeper');
    expect(plannedInWords(list)).toBe('2 targets of a list, one assumed curve in H');
  });
});
