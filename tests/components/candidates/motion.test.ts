import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { concludeMotion, fitWords, whyNoTest } from '@/components/candidates/hypothesis-words';
import { motionData } from '@/components/candidates/motion-data';
import { MotionSection } from '@/components/candidates/motion-section';
import { MotionTrackChart, motionSentence } from '@/components/charts/motion-track-chart';
import { backgroundShift, offsetOf } from '@/lib/sensitivity/vetting';
import { buildCandidate, fitOf } from './build-candidate';

const name = 'Host cc1';

describe('the track chart', () => {
  it('says how far the last epoch lies from both hypotheses', () => {
    const { epochs, track } = motionData(buildCandidate());
    expect(motionSentence({ name, epochs, track })).toBe(
      'Offsets of Host cc1 from its star at 2 epochs, 2015-08-15 to 2019-04-20; on 2019-04-20 it lies 0.80 σ from moving with the star and 54 σ from a source at rest behind it',
    );
  });

  it('says so where the track is not known', () => {
    const bare = buildCandidate({ motion: null, motionMissing: 'no motion', hypotheses: null });
    const { epochs, track } = motionData(bare);
    expect(track).toEqual([]);
    expect(motionSentence({ name, epochs, track })).toContain(
      'the track of a background source is not known',
    );
  });

  it('draws each measured epoch, and where a background source would be at each but the reference', () => {
    const markup = renderToStaticMarkup(
      createElement(MotionTrackChart, { name, ...motionData(buildCandidate()) }),
    );
    expect(markup.match(/class="star-dot"/g)).toHaveLength(2);
    expect(markup.match(/class="saved-dot"/g)).toHaveLength(1);
    expect(markup.match(/class="stem"/g)).toHaveLength(4);
    expect(markup).toContain('2015-08, reference');
    expect(markup).toContain('aria-valuetext="2015-08-15, reference');
  });

  it('puts east to the left', () => {
    const candidate = buildCandidate();
    const east = (place: number) => ({
      ...candidate.seen[0],
      id: String(place),
      separationArcsec: place,
      positionAngleDeg: 90,
    });
    const two = buildCandidate({ seen: [east(1), east(2)], hypotheses: null });
    const markup = renderToStaticMarkup(
      createElement(MotionTrackChart, { name, ...motionData(two) }),
    );
    const [near, far] = [...markup.matchAll(/class="star-dot" cx="([\d.]+)"/g)].map(([, x]) =>
      Number(x),
    );
    expect(far).toBeLessThan(near);
  });
});

describe('motionData', () => {
  it('carries the reference to each epoch by the shift of the background', () => {
    const candidate = buildCandidate();
    const { motion, seen } = candidate;
    if (!motion) throw new Error('the sample has a motion');
    const [, last] = motionData(candidate).epochs;
    const start = offsetOf(seen[0]);
    const shift = backgroundShift(motion, seen[0].julianYear, seen[1].julianYear);
    expect(last.background?.eastArcsec).toBeCloseTo(start.eastArcsec + shift.eastArcsec, 12);
    expect(last.background?.northArcsec).toBeCloseTo(start.northArcsec + shift.northArcsec, 12);
    // Position angle 37.3 is both east and north: the errors turn with it.
    const [sine, cosine] = [Math.sin((37.3 * Math.PI) / 180), Math.cos((37.3 * Math.PI) / 180)];
    const across = 0.842 * 0.3 * (Math.PI / 180);
    const [first] = motionData(candidate).epochs;
    expect(first.errorEastArcsec).toBeCloseTo(Math.hypot(0.004 * sine, across * cosine), 12);
    expect(first.errorNorthArcsec).toBeCloseTo(Math.hypot(0.004 * cosine, across * sine), 12);
  });

  it('is empty without an epoch', () => {
    expect(motionData(buildCandidate({ seen: [], hypotheses: null }))).toEqual({
      epochs: [],
      track: [],
    });
  });
});

describe('the hypotheses in words', () => {
  const fits = fitOf(1.2, 0.55);
  const refused = fitOf(2900, 0);
  it.each([
    [fits, refused, 'It moves with its star.'],
    [refused, fits, 'It stands still behind its star.'],
    [fits, fits, 'The epochs cannot tell yet.'],
    [refused, refused, 'Neither hypothesis fits.'],
  ])('are concluded from both', (commonProperMotion, background, title) => {
    const observationIds = ['a', 'b'];
    expect(concludeMotion({ observationIds, commonProperMotion, background }).title).toBe(title);
  });

  it('state chi-squared, degrees of freedom and chance', () => {
    expect(fitWords(fits)).toBe('χ² 1.20 for 2 degrees of freedom, chance 55\u2009%: fits');
    expect(fitWords(refused)).toContain('less than one in a million: refused');
  });

  it('say on the page what refuses and what is not modelled', () => {
    const markup = renderToStaticMarkup(
      createElement(MotionSection, { candidate: buildCandidate() }),
    );
    expect(markup).toContain('It moves with its star.');
    expect(markup).toContain('Orbital motion is not modelled');
  });

  it('say what would make a test', () => {
    const seen = buildCandidate().seen.slice(0, 1);
    expect(whyNoTest(buildCandidate({ seen, hypotheses: null }))).toContain('1 epoch has them');
    const missing = { motion: null, motionMissing: 'The list has no proper motion of Host' };
    expect(whyNoTest(buildCandidate(missing))).toBe('The list has no proper motion of Host.');
  });
});
