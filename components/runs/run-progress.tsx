'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { cancelJob, retryJob } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { ProgressLine } from '@/components/ui/progress-line';
import { TextAction } from '@/components/ui/text-action';
import type { RunSummary } from '@/lib/schemas/runs';
import { formatDuration } from './time-words';

interface RunProgressProps {
  collaboration: string;
  run: RunSummary;
  canStop: boolean;
  /** The server's state has changed: ask again. */
  onChanged(): void;
}

/** A run on its way: stage, counts, time left, and the way to stop it. */
export function RunProgress({ collaboration, run, canStop, onChanged }: RunProgressProps) {
  const [isStopping, setStopping] = useState(false);
  const [problem, setProblem] = useState<string>();
  const { job } = run;
  const isWaiting = job.status === 'waiting';

  const stop = async () => {
    setStopping(true);
    try {
      await cancelJob(collaboration, job.id);
      onChanged();
    } catch (reason) {
      setProblem(sentenceOf(reason));
      setStopping(false);
    }
  };

  return (
    <section aria-label={`Run ${run.number} on its way`} aria-live="polite">
      <ProgressLine
        label={isWaiting ? 'Waiting for a worker' : sentenceCase(job.stage || 'starting')}
        accessibleName={`Run ${run.number}, ${job.stage || 'waiting'}`}
        done={job.done}
        total={job.total}
        state={isWaiting ? 'waiting' : 'running'}
        time={job.timeLeftS === null ? undefined : `about ${formatDuration(job.timeLeftS)} left`}
        action={
          canStop ? (
            <Button size="small" onClick={stop} isBusy={isStopping || job.cancelRequested}>
              {job.cancelRequested ? 'Stopping' : 'Stop'}
            </Button>
          ) : undefined
        }
      />
      <p className="mt-2 text-ink3 text-note">
        Run {run.number} is computed by the workers. You may leave; the result is kept.
      </p>
      {problem !== undefined && (
        <Notice tone="bad" title="It was not stopped." isAnnounced>
          {problem}
        </Notice>
      )}
    </section>
  );
}

/** A run that ended without a result: why, and the control that mends it. */
export function RunEnded({ collaboration, run, canStop, onChanged }: RunProgressProps) {
  const [problem, setProblem] = useState<string>();
  const [isBusy, setBusy] = useState(false);
  const { job } = run;
  const wasStopped = job.status === 'cancelled';

  const retry = async () => {
    setBusy(true);
    try {
      await retryJob(collaboration, job.id);
      setProblem(undefined);
      onChanged();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setBusy(false);
    }
  };

  return (
    <Notice
      tone={wasStopped ? 'neutral' : 'bad'}
      title={wasStopped ? `Run ${run.number} was stopped.` : `Run ${run.number} failed.`}
      isAnnounced
      actions={
        canStop ? (
          <TextAction icon="undo" onClick={retry} aria-disabled={isBusy}>
            {wasStopped ? 'Run it after all' : 'Retry'}
          </TextAction>
        ) : undefined
      }
    >
      {problem ?? job.fault ?? (wasStopped ? 'Nothing of it was stored.' : 'It gave no reason.')}
    </Notice>
  );
}

function sentenceCase(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
