import { describe, expect, it } from 'vitest';
import { headlineOf } from '@/workers/tasks/study-words';
import { buildForecast, buildInfluence, buildSystematics } from './check-fixtures';
import {
  buildFreeIndices,
  buildLimitMap,
  buildOverlaps,
  buildPlaneSweep,
  buildSweep,
} from './fixtures';

const run = { quantity: 'host_fraction', credibleLevel: 0.95, limit: 0.0576 } as const;
const plain = (text: string) => text.replaceAll('\u2009', ' ');
const headline = (result: Parameters<typeof headlineOf>[0]) => plain(headlineOf(result, run));

describe('the headline of an answer', () => {
  it.each([
    buildFreeIndices(),
    buildLimitMap(),
    buildSweep(),
    buildPlaneSweep(),
    buildSystematics(),
    buildOverlaps(),
    buildInfluence(),
    buildForecast(),
  ])('gives its limits with their level: $kind', (result) => {
    expect(headline(result)).toMatch(/<[\d.]+ % \(95 %\)/);
  });

  it('names the parameter of a sweep and its unit', () => {
    expect(headline(buildSweep())).toMatch(
      /^Largest semi-major axis: <[\d.]+ % \(95 %\) at 30 AU, <[\d.]+ % \(95 %\) at 1000 AU$/,
    );
  });

  it('quotes indices as dN/dM and dN/da, one less than they are stored', () => {
    expect(headline(buildPlaneSweep())).toMatch(/over α −3 to 0 and β −3 to 0, of dN\/dM/);
    const alone = {
      ...buildSweep(),
      over: 'mass-index' as const,
      value: [-2, 1],
      limit: [0.1, 0.2],
    };
    expect(headline(alone)).toBe('<10 % (95 %) at α = −3 of dN/dM, <20 % (95 %) at α = 0 of dN/dM');
  });

  it('tells the limit with the run from the one of the planned stars alone', () => {
    expect(headline(buildForecast())).toContain(
      'if none, with the run <4.1 % (95 %), now <5.8 %; planned stars alone <6.3 % (95 %)',
    );
  });

  it('claims no more than what was varied', () => {
    expect(headline(buildSystematics())).toBe(
      'Of what the data rest on, most: cooling table Cold start 2, <8.5 % (95 %), 1.47 times the run’s <5.8 %',
    );
  });
});
