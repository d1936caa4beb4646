'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';

export interface KeptActionsProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run. */
  run?: RunSummary;
  /** A run is on its way. */
  isBusy: boolean;
  /** At the foot of a narrow screen only what a thumb needs. */
  placement: 'head' | 'foot';
  onSaved(): void;
}

export const WAIT = 'A run is on its way: wait for it or stop it first.';
export const mayChange = ({ can }: AnalysisView) => can.change && can.run;
export const nextNumber = ({ runs }: AnalysisView) => (runs[0]?.number ?? 0) + 1;

type Work = 'save' | 'copy' | 'run';
/** In place of a key: nothing was stored, and the person decides. */
export const HELD = Symbol('held');

/** One piece of work at a time; a key that it answers is where the person goes on. */
export function useWork(collaboration: string, onSaved: () => void) {
  const router = useRouter();
  const [work, setWork] = useState<Work>();
  const [problem, setProblem] = useState<string>();
  const perform = async (kind: Work, task: () => Promise<string | typeof HELD | undefined>) => {
    setWork(kind);
    setProblem(undefined);
    try {
      const key = await task();
      if (key === HELD) return;
      if (key !== undefined) router.push(`/${collaboration}/analyses/${key}`);
      else onSaved();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setWork(undefined);
    }
  };
  const dialog = (
    <Dialog
      isOpen={problem !== undefined}
      onClose={() => setProblem(undefined)}
      title="It was not done"
      actions={
        <Button variant="primary" onClick={() => setProblem(undefined)}>
          Back to the result
        </Button>
      }
    >
      <p>{problem}</p>
    </Dialog>
  );
  return { work, perform, dialog };
}
