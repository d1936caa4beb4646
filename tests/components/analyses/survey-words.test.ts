import { expect, it } from 'vitest';
import { surveyWords } from '@/components/analyses/survey-choice';

const ofMaps = (stale: number | null) =>
  surveyWords({
    targets: 96,
    band: 'H',
    maps: { ready: 96, waiting: 0, failed: 0, none: 0, stale },
  });

it('says of a survey to choose how many of its ready maps are stale', () => {
  expect(ofMaps(0)).toBe('96 targets in H, all maps made');
  expect(ofMaps(null)).toBe('96 targets in H, all maps made');
  expect(ofMaps(90)).toBe(
    '96 targets in H, all maps made, 90 of them stale: refresh them first (survey, Maps)',
  );
});
