import { act, useState } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { useFault, useFaultyFields } from '@/components/analyses/faulty-fields';
import { screenOf } from '../../support/hook';

afterEach(() => vi.unstubAllGlobals());

describe('fields in red', () => {
  it('are named as long as they are wrong, so that nothing is run from them', async () => {
    const page = await screenOf(() => {
      const [level, setLevel] = useState<string>();
      const { report, words } = useFaultyFields();
      useFault(report, level);
      useFault(report, undefined);
      return { words, setLevel };
    });
    expect(page.now.words).toBeUndefined();
    await act(async () => page.now.setLevel('Credible level: Above 0 and below 100 %.'));
    expect(page.now.words).toBe(
      'Correct the field in red first. Credible level: Above 0 and below 100 %.',
    );
    await act(async () => page.now.setLevel(undefined));
    expect(page.now.words).toBeUndefined();
  });
});
