import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { computeCompletenessMap } from '@/lib/sensitivity';
import { npyHeader, readNpy, writeNpy } from '@/tests/bench/npy';
import { inventSurvey } from '@/tests/bench/survey';
import { readSurvey, writeSurvey } from '@/tests/bench/survey-file';

describe('a survey file', () => {
  it('gives the same maps when it is read back', () => {
    const written = inventSurvey(2, 'smooth');
    const read = readSurvey(writeSurvey(written));
    written.stars.forEach((star, i) => {
      const before = computeCompletenessMap(star, written.cooling, written.grid, written.settings);
      const after = computeCompletenessMap(read.stars[i], read.cooling, read.grid, read.settings);
      expect(after.map.completeness).toEqual(before.map.completeness);
    });
  });

  it('is refused by the path of what is missing', () => {
    const survey = JSON.parse(writeSurvey(inventSurvey(1, 'hard')));
    delete survey.stars[0].curves[0].contrastMag;
    expect(() => readSurvey(JSON.stringify(survey))).toThrow('stars[0].curves[0].contrastMag');
    expect(() => readSurvey('{}')).toThrow('survey.grid');
  });
});

describe('a NumPy file of maps', () => {
  it('begins its values at a multiple of 64 bytes, as its format asks', () => {
    for (const shape of [[78, 56, 64], [5000, 100, 100], [1]]) {
      const header = npyHeader(shape);
      expect(header.length % 64).toBe(0);
      expect(header.readUInt16LE(8)).toBe(header.length - 10);
      expect(header.at(-1)).toBe(0x0a);
    }
  });

  it('keeps shape and values to 32 bits, and refuses too few', () => {
    const folder = mkdtempSync(path.join(tmpdir(), 'maps-'));
    const file = path.join(folder, 'maps.npy');
    try {
      writeNpy(file, [2, 1, 2], [Float64Array.of(0, 0.25), Float64Array.of(1, 0.1)]);
      const { shape, values } = readNpy(readFileSync(file));
      expect(shape).toEqual([2, 1, 2]);
      expect([...values]).toEqual([0, 0.25, 1, Math.fround(0.1)]);
      expect(() => writeNpy(file, [2, 2], [Float64Array.of(1)])).toThrow('do not fill');
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});
