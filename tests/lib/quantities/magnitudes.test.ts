import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  absoluteMagnitude,
  apparentMagnitude,
  contrastMagFromFluxRatio,
  distanceModulus,
  distancePcFromParallax,
  fluxRatio,
  isParallaxBiased,
  magnitudeError,
  relativeFluxError,
} from '@/lib/quantities/magnitudes';

describe('distances', () => {
  test('distanceModulus(d) is 0 at 10 pc and refuses d <= 0', () => {
    expect(distanceModulus(10)).toBe(0);
    expect(() => distanceModulus(0)).toThrow('distancePc must be finite and > 0, got 0');
  });

  test('distancePcFromParallax(p) refuses p <= 0, and 1/p is biased above 10 %', () => {
    expect(distancePcFromParallax(50)).toBe(20);
    expect(() => distancePcFromParallax(-1)).toThrow('parallaxMas must be finite and > 0, got -1');
    expect(isParallaxBiased(10, 1)).toBe(false);
    expect(isParallaxBiased(10, 1.1)).toBe(true);
  });
});

describe('magnitudes', () => {
  test('absolute and apparent are each other’s inverse, extinction included', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -5, max: 30, noNaN: true }),
        fc.double({ min: 0.1, max: 5000, noNaN: true }),
        fc.double({ min: 0, max: 3, noNaN: true }),
        (mag, distance, extinction) => {
          const absolute = absoluteMagnitude(mag, distance, extinction);
          expect(apparentMagnitude(absolute, distance, extinction)).toBeCloseTo(mag, 9);
        },
      ),
    );
  });

  test('a contrast and its flux ratio are each other’s inverse', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 25, noNaN: true }), (contrast) => {
        expect(contrastMagFromFluxRatio(fluxRatio(contrast))).toBeCloseTo(contrast, 9);
      }),
    );
  });

  test('a companion brighter than its star is refused in either form', () => {
    expect(() => fluxRatio(-0.1)).toThrow('contrastMag must be >= 0, got -0.1');
    expect(() => contrastMagFromFluxRatio(1)).toThrow('ratio must be above 0 and below 1, got 1');
  });

  test('errors of flux and magnitude convert back and forth', () => {
    expect(magnitudeError(0.01)).toBeCloseTo(0.010857, 6);
    expect(relativeFluxError(magnitudeError(0.03))).toBeCloseTo(0.03, 15);
    expect(() => magnitudeError(-1)).toThrow(RangeError);
  });
});
