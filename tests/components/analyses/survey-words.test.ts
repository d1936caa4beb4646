import { describe, expect, it } from 'vitest';
import { surveyWords } from '@/components/analyses/survey-choice';

const survey = {
  targets: 96,
  band: 'H',
  maps: { ready: 96, waiting: 0, failed: 0, none: 0 },
};

describe('words of a survey to choose', () => {
  it('say how many of its ready maps are stale', () => {
    expect(surveyWords(survey, 0)).toBe('96 targets in H, all maps ready');
    expect(surveyWords(survey, 90)).toBe(
      '96 targets in H, all maps ready, 90 of them stale: refresh them first (survey, Maps)',
    );
  });
});
