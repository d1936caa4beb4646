import { describe, expect, it } from 'vitest';
import { hasOwnPopulation, sharedVersion } from '@/components/runs/shared-version';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { definition } from './sample';

const moved = { definition: { ...definition, massMinMjup: 2 * definition.massMinMjup } };
const analysisWith = (isShared: boolean, saveVersion: boolean) =>
  ({
    population: { key: 'P-5', isShared, can: { saveVersion }, definition },
  }) as unknown as AnalysisView;

describe('saving a moved range', () => {
  it('is asked about where it makes a version of a shared population', () => {
    expect(sharedVersion(analysisWith(true, true), moved)).toBe('P-5');
    expect(sharedVersion(analysisWith(true, true), { definition })).toBeUndefined();
    expect(sharedVersion(analysisWith(false, true), moved)).toBeUndefined();
    expect(sharedVersion(analysisWith(true, false), moved)).toBeUndefined();
    expect(hasOwnPopulation(analysisWith(true, false), moved)).toBe(true);
  });
});
