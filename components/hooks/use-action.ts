'use client';

import { useState } from 'react';
import type { Fault } from '@/lib/errors';
import { ApiProblem, sentenceOf } from './api-problem';

interface Refusal {
  /** Why it was refused, as a sentence. */
  problem: string | undefined;
  /** The places of what was refused, where they are known. */
  faults: Fault[];
}

/** What one press does, as the screen shows it: whether it is under way, and why it was refused. */
export interface Action extends Refusal {
  isBusy: boolean;
  /** Does the work and answers whether it is done. What it throws is kept here until the next press. */
  perform(work: () => Promise<unknown>): Promise<boolean>;
  /** Forgets why it was refused. */
  clear(): void;
}

const none: Refusal = { problem: undefined, faults: [] };

/**
 * The state around one press.
 *
 * @param leaves what is pressed goes away once the work is done: until then it stays busy, so that a
 *   second press does not do it twice
 */
export function useAction({ leaves = false }: { leaves?: boolean } = {}): Action {
  const [isBusy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState(none);
  return {
    ...refusal,
    isBusy,
    perform: async (work) => {
      setBusy(true);
      setRefusal(none);
      try {
        await work();
        if (!leaves) setBusy(false);
        return true;
      } catch (reason) {
        const faults = reason instanceof ApiProblem ? reason.faults : none.faults;
        setRefusal({ problem: sentenceOf(reason), faults });
        setBusy(false);
        return false;
      }
    },
    clear: () => setRefusal(none),
  };
}
