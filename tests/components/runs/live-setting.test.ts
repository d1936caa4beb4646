import { describe, expect, it } from 'vitest';
import { priorFromText, settingFromQuery } from '@/components/runs/live-address';
import {
  isSameSetting,
  type LiveSetting,
  priorToText,
  settingToQuery,
} from '@/components/runs/live-setting';
import type { RatePriorInput } from '@/lib/schemas/analyses';
import { definition } from './sample';

const saved: LiveSetting = {
  definition,
  credibleLevel: 0.95,
  detections: 'counted',
  likelihood: 'host-fraction',
  prior: { law: 'uniform', max: 1 },
};

describe('settings in the address', () => {
  it('settingToQuery leaves out what is as saved', () => {
    expect(settingToQuery(saved, saved)).toEqual({});
  });

  it('settingToQuery quotes indices in the linear convention', () => {
    const moved = { ...saved, definition: { ...definition, massIndex: 0.1 } };
    expect(settingToQuery(moved, saved)).toEqual({ alpha: '-0.9' });
  });

  it('settingFromQuery gives back every part that settingToQuery wrote', () => {
    const moved: LiveSetting = {
      definition: {
        ...definition,
        massMinMjup: 3.5,
        semiMajorAxisMaxAu: 210,
        massIndex: -0.75,
        semiMajorAxisIndex: 1.05,
      },
      credibleLevel: 0.9,
      detections: 'none',
      likelihood: 'mean-number',
      prior: { law: 'log-uniform', min: 0.002, max: 2 },
    };
    const back = settingFromQuery(settingToQuery(moved, saved), saved);
    expect(isSameSetting(back, moved)).toBe(true);
  });

  it('settingFromQuery keeps the saved value of a part that cannot be read', () => {
    const asked = { mass: '30-2', axis: 'wide', alpha: 'steep', level: '95', prior: 'uniform:0' };
    expect(settingFromQuery(asked, saved)).toEqual(saved);
  });

  const priors: RatePriorInput[] = [
    { law: 'uniform', max: 0.5 },
    { law: 'log-uniform', min: 0.001, max: 1 },
    { law: 'jeffreys' },
    { law: 'jeffreys', max: 2 },
    { law: 'gamma', shape: 0.5, rate: 3 },
    { law: 'beta', a: 2, b: 5 },
  ];
  it.each(priors)('priorFromText reads what priorToText wrote: $law', (prior) => {
    expect(priorFromText(priorToText(prior))).toEqual(prior);
  });
});
