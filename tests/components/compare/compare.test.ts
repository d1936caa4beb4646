import { describe, expect, it } from 'vitest';
import { points } from '@/components/charts/steps-chart';
import { mostSides, readSides, writeSide } from '@/components/compare/address';
import { type ComparedRun, sampleWords } from '@/components/compare/differences';
import { wayFromAToB } from '@/components/compare/from-a-to-b';
import { isTold } from '@/components/compare/star-by-star';
import { compareSentences } from '@/components/compare/words';
import { askedOf } from '@/components/runs/live-answer';
import { restrictSample } from '@/components/runs/live-sample';
import type { LiveSetting } from '@/components/runs/live-setting';
import { answerQuestion } from '@/lib/inference';
import type { DrawnInputs } from '@/lib/schemas/runs';
import { buildSample, definition } from '../runs/sample';

describe('addresses of a comparison', () => {
  it('name an analysis, one of its runs, or a run without its detections', () => {
    expect(readSides('A-31,A-31.2,A-32:none,A-7.1:none')).toEqual([
      { key: 'A-31', isZero: false },
      { key: 'A-31', run: 2, isZero: false },
      { key: 'A-32', isZero: true },
      { key: 'A-7', run: 1, isZero: true },
    ]);
    expect(readSides('A-31.2:none').map(writeSide)).toEqual(['A-31.2:none']);
  });

  it('leave out what is no analysis or comes twice, and stop at six', () => {
    expect(readSides('A-1,A-1,drop table,A-x, A-2')).toHaveLength(2);
    expect(readSides(undefined)).toEqual([]);
    const many = Array.from({ length: 9 }, (_, i) => `A-${i + 1}`).join();
    expect(readSides(many)).toHaveLength(mostSides);
  });
});

describe('what a comparison says', () => {
  it('calls a step that no shown digit tells no change', () => {
    expect(points(-3.1e-10, 0.058)).toBe('no change');
    expect(points(2e-5, 0.058)).toBe('no change');
    expect(points(-0.003, 0.058)).toBe('−0.30 points');
    expect([isTold(0.0004), isTold(-0.0006)]).toEqual([false, true]);
  });

  it('compares maps by their values, whoever made them', () => {
    const inputsOf = (mapChecksum: string) =>
      ({ stars: [{ starId: 'one', mapChecksum }] }) as unknown as DrawnInputs;
    expect(sampleWords(inputsOf('ab'), inputsOf('ab'))).toBe('as in A');
    expect(sampleWords(inputsOf('cd'), inputsOf('ab'))).toBe('1 other than in A');
  });

  it('warns in its words too where the limits answer different questions', () => {
    const side = (name: string, credibleLevel: number, limit: number) =>
      ({
        name,
        result: {
          quantity: 'host_fraction',
          credibleLevel,
          answer: { limit, isConstrained: true },
        },
      }) as unknown as ComparedRun;
    const sides = [side('A-1', 0.95, 0.1), side('A-2', 0.9, 0.039)];
    const level = { name: 'Level', values: ['95 %', '90 %'], changesQuestion: true };
    expect(compareSentences(sides, [level])).toContain(
      'The limits answer different questions: level differs. Beside the limit of A-1',
    );
    const prior = { name: 'Prior', values: ['one', 'other'], changesQuestion: false };
    expect(compareSentences(sides, [prior])).not.toContain('different questions');
  });
});

describe('wayFromAToB', () => {
  const sample = buildSample(24);
  const a: LiveSetting = {
    definition,
    credibleLevel: 0.95,
    detections: 'counted',
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
  };
  const b: LiveSetting = {
    ...a,
    definition: { ...definition, massIndex: 0.2, semiMajorAxisMaxAu: 150 },
    detections: 'none',
    credibleLevel: 0.9,
  };
  const limitOf = (of: typeof sample, setting: LiveSetting) =>
    answerQuestion({
      ...askedOf(of, setting),
      ...{ maps: of.maps, grid: of.grid, population: setting.definition },
    }).limit;
  const pause = async () => {};

  it('leads from the one limit to the other, a step for each difference', async () => {
    const ends = { a: { setting: a, sample }, b: { setting: b, sample } };
    const way = await wayFromAToB(ends, true, pause);
    expect(way?.from).toBeCloseTo(limitOf(sample, a), 12);
    expect(way?.to).toBeCloseTo(limitOf(sample, b), 12);
    expect(way?.steps.map(({ name }) => name)).toEqual([
      'Detections',
      'Semi-major axis',
      'Mass index α',
      'Level',
    ]);
    const sum = way?.steps.reduce((all, { averaged }) => all + averaged, 0);
    expect(sum).toBeCloseTo(limitOf(sample, b) - limitOf(sample, a), 10);
    expect(way?.steps[0].inOrder).toBeCloseTo(
      limitOf(sample, { ...a, detections: 'none' }) - limitOf(sample, a),
      12,
    );
  });

  it('counts other stars as one step of their own', async () => {
    const half = restrictSample(sample, ({ starId }) => Number(starId.slice(5)) % 2 === 0);
    const ends = { a: { setting: a, sample }, b: { setting: a, sample: half } };
    const way = await wayFromAToB(ends, false, pause);
    expect(way?.steps.map(({ name }) => name)).toEqual(['Stars and maps']);
    expect(way?.steps[0].averaged).toBeCloseTo(limitOf(half, a) - limitOf(sample, a), 12);
  });

  it('has no steps between equals', async () => {
    const ends = { a: { setting: a, sample }, b: { setting: a, sample } };
    expect(await wayFromAToB(ends, true, pause)).toBeUndefined();
  });
});
