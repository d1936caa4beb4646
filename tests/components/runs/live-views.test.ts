import { describe, expect, it } from 'vitest';
import { limitWithout, withoutWords } from '@/components/runs/limit-without';
import { askedOf } from '@/components/runs/live-answer';
import { restrictSample } from '@/components/runs/live-sample';
import type { LiveSetting } from '@/components/runs/live-setting';
import { LiveViews } from '@/components/runs/live-views';
import { answerQuestion, viewPopulation } from '@/lib/inference';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { buildSample, definition } from './sample';

const sample = buildSample();
const setting: LiveSetting = {
  definition,
  credibleLevel: 0.95,
  detections: 'counted',
  likelihood: 'host-fraction',
  prior: { law: 'uniform', max: 1 },
};

describe('LiveViews', () => {
  it('follows whatever moves, one axis or both, as the whole maps do', () => {
    const views = new LiveViews(sample);
    const moves: Partial<PowerLawDefinition>[] = [
      {},
      { massIndex: -0.5 },
      { massIndex: -0.9 },
      { massIndex: -0.9, massMinMjup: 3 },
      { massIndex: -0.9, massMinMjup: 3, semiMajorAxisMaxAu: 500 },
      { massIndex: -0.9, massMinMjup: 3, semiMajorAxisMaxAu: 640, semiMajorAxisIndex: 0.1 },
      { massIndex: -0.9, massMinMjup: 3, semiMajorAxisMaxAu: 640, semiMajorAxisIndex: 0.1 },
      { massIndex: 0.2, semiMajorAxisIndex: -0.2 },
      { massIndex: 0.3, semiMajorAxisIndex: -0.2 },
    ];
    for (const move of moves) {
      const moved = { ...definition, ...move };
      const whole = viewPopulation(sample.maps, sample.grid, moved);
      const view = views.of(moved);
      expect(view.exposure / whole.exposure).toBeCloseTo(1, 12);
      expect(view.shareOutsideMap).toBeCloseTo(whole.shareOutsideMap, 12);
      view.completenessPerStar?.forEach((seen, star) => {
        expect(seen).toBeCloseTo(whole.completenessPerStar?.[star] ?? Number.NaN, 12);
      });
    }
  });

  it('refuses a population beyond the maps, and goes on from the one before', () => {
    const views = new LiveViews(sample);
    views.of(definition);
    expect(() => views.of({ ...definition, massMinMjup: 900, massMaxMjup: 990 })).toThrow(
      RangeError,
    );
    expect(views.of(definition).exposure).toBeCloseTo(
      viewPopulation(sample.maps, sample.grid, definition).exposure,
      10,
    );
  });
});

describe('limitWithout', () => {
  const view = viewPopulation(sample.maps, sample.grid, definition);

  it('is the limit of the rest of the sample, with the detections of the rest', () => {
    const left = new Set(['Star 39', 'Star 3', 'Star 20']);
    const rest = restrictSample(sample, ({ name }) => !left.has(name));
    const { limit } = answerQuestion({
      ...askedOf(rest, setting),
      ...{ maps: rest.maps, grid: rest.grid, population: definition },
    });
    const without = limitWithout(sample, view, setting, left);
    expect(without?.limit).toBeCloseTo(limit, 12);
    expect(without).toMatchObject({ stars: 3, detections: ['inside b'] });
    expect(without && withoutWords(without)).toBe('these 3 stars and their one detection');
  });

  it('has no answer for nobody and for everybody', () => {
    expect(limitWithout(sample, view, setting, new Set(['nobody']))).toBeUndefined();
    const all = new Set(sample.stars.map(({ name }) => name));
    expect(limitWithout(sample, view, setting, all)).toBeUndefined();
  });
});
