import { describe, expect, it } from 'vitest';
import {
  consequencesInSteps,
  finishSteps,
  linearTrackInSteps,
} from '@/components/runs/consequences';
import { askedOf, liveAnswer } from '@/components/runs/live-answer';
import { restrictSample } from '@/components/runs/live-sample';
import type { LiveSetting } from '@/components/runs/live-setting';
import { answerQuestion, viewPopulation } from '@/lib/inference';
import { toLogIndex } from '@/lib/population';
import { buildSample, definition } from './sample';

const sample = buildSample();
const setting: LiveSetting = {
  definition,
  credibleLevel: 0.95,
  detections: 'counted',
  likelihood: 'host-fraction',
  prior: { law: 'uniform', max: 1 },
};

function directLimit(changes: Partial<LiveSetting>): number {
  const changed = { ...setting, ...changes };
  return answerQuestion({
    ...askedOf(sample, changed),
    maps: sample.maps,
    grid: sample.grid,
    population: changed.definition,
  }).limit;
}

describe('consequences of the controls', () => {
  it.each(['massIndex', 'semiMajorAxisIndex'] as const)(
    'the track of %s is the limit of each index, computed from the whole maps',
    (field) => {
      const { values, limits } = finishSteps(linearTrackInSteps(sample, setting, setting, field));
      values.forEach((value, index) => {
        const moved = { ...definition, [field]: toLogIndex(value, 'linear') };
        expect(limits[index] / directLimit({ definition: moved })).toBeCloseTo(1, 9);
      });
    },
  );

  it('a track is kept while its own control moves, and made anew when another does', () => {
    const track = (changes: Partial<typeof definition>) => {
      const changed = { ...setting, definition: { ...definition, ...changes } };
      return finishSteps(linearTrackInSteps(sample, changed, setting, 'massIndex'));
    };
    const before = track({});
    expect(track({ massIndex: definition.massIndex + 0.1 })).toBe(before);
    const massMinMjup = 1.2 * definition.massMinMjup;
    const after = track({ massMinMjup });
    const massIndex = toLogIndex(after.values[3], 'linear');
    const direct = directLimit({ definition: { ...definition, massMinMjup, massIndex } });
    expect(after.limits[3] / direct).toBeCloseTo(1, 9);
    expect(after.limits[3]).not.toBeCloseTo(before.limits[3], 6);
  });

  it('consequencesInSteps gives each switch the limit that choosing it would give', () => {
    const given = finishSteps(consequencesInSteps(sample, setting, setting));
    expect(given?.switches.detections.counted).toBe(directLimit({}));
    expect(given?.switches.detections.none).toBe(directLimit({ detections: 'none' }));
    expect(given?.switches.likelihood['mean-number']).toBe(
      directLimit({ likelihood: 'mean-number' }),
    );
    expect(given?.switches.prior.jeffreys).toBe(directLimit({ prior: { law: 'jeffreys' } }));
  });

  it('the track of the level rises', () => {
    const limits = finishSteps(consequencesInSteps(sample, setting, setting))?.level.limits ?? [];
    expect(limits.length).toBeGreaterThan(10);
    for (let i = 1; i < limits.length; i++) expect(limits[i]).toBeGreaterThan(limits[i - 1]);
  });

  it('consequencesInSteps is null where the population lies outside the maps', () => {
    const far = { ...definition, semiMajorAxisMinAu: 2000, semiMajorAxisMaxAu: 5000 };
    expect(
      finishSteps(consequencesInSteps(sample, { ...setting, definition: far }, setting)),
    ).toBeNull();
  });
});

describe('liveAnswer', () => {
  const view = viewPopulation(sample.maps, sample.grid, definition);

  it('counts a companion inside the ranges and leaves one outside aside', () => {
    const { full } = liveAnswer(sample, view, setting);
    expect(full.counted.map(({ name }) => name)).toEqual(['inside b']);
    expect(full.setAside.map(({ detection }) => detection.name)).toEqual(['outside b']);
  });

  it('sets every detection aside for the other limit, which is lower', () => {
    const live = liveAnswer(sample, view, setting);
    expect(live.zero.limit).toBe(directLimit({ detections: 'none' }));
    expect(live.zero.limit).toBeLessThan(live.answer.limit);
  });

  it('puts an unusual level among the rows of the table', () => {
    const levels = liveAnswer(sample, view, { ...setting, credibleLevel: 0.8 }).levels();
    expect(levels.map(({ level }) => level)).toEqual([0.68, 0.8, 0.9, 0.95, 0.99, 0.997]);
  });

  it('has no counterpart of a beta prior for the mean number', () => {
    const prior = { law: 'beta', a: 1, b: 2 } as const;
    const levels = liveAnswer(sample, view, { ...setting, prior }).levels();
    expect(levels.every(({ meanNumber }) => meanNumber === null)).toBe(true);
    expect(levels.every(({ hostFraction }) => hostFraction !== null)).toBe(true);
  });
});

describe('restrictSample', () => {
  it('keeps the maps and companions of the stars that stay', () => {
    const half = restrictSample(sample, (star) => star.surveys.includes('second'));
    const whole = viewPopulation(sample.maps, sample.grid, definition).completenessPerStar;
    const kept = viewPopulation(half.maps, half.grid, definition).completenessPerStar;
    half.stars.forEach((star, index) => {
      const before = sample.stars.findIndex(({ starId }) => starId === star.starId);
      expect(kept?.[index]).toBe(whole?.[before]);
    });
    half.companions.forEach(({ star, name }) => {
      const before = sample.companions.find((companion) => companion.name === name);
      expect(half.stars[star]).toBe(sample.stars[before?.star ?? -1]);
    });
  });
});
