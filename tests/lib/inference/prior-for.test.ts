import { describe, expect, it } from 'vitest';
import { priorFor } from '@/lib/inference/prior-for';

describe('priorFor(prior, likelihood)', () => {
  it('cuts a prior at 1 for a fraction and leaves it for a mean number', () => {
    expect(priorFor({ law: 'uniform', max: 2 }, 'host-fraction')).toEqual({
      law: 'uniform',
      max: 1,
    });
    expect(priorFor({ law: 'uniform', max: 2 }, 'mean-number')).toEqual({ law: 'uniform', max: 2 });
    expect(priorFor({ law: 'log-uniform', min: 0.01, max: 3 }, 'host-fraction')).toEqual({
      law: 'log-uniform',
      min: 0.01,
      max: 1,
    });
    expect(priorFor({ law: 'jeffreys', max: 4 }, 'host-fraction')).toEqual({
      law: 'jeffreys',
      max: 1,
    });
    expect(priorFor({ law: 'jeffreys' }, 'host-fraction')).toEqual({ law: 'jeffreys' });
  });

  it('has no counterpart for a law that belongs to one quantity', () => {
    expect(priorFor({ law: 'gamma', shape: 1, rate: 2 }, 'host-fraction')).toBeNull();
    expect(priorFor({ law: 'beta', a: 1, b: 2 }, 'mean-number')).toBeNull();
    expect(priorFor({ law: 'log-uniform', min: 1.5, max: 3 }, 'host-fraction')).toBeNull();
  });
});
