'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { cancelJob, retryJob } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { ProgressLine } from '@/components/ui/progress-line';
import { TextAction } from '@/components/ui/text-action';
import type { JobView } from '@/lib/schemas/jobs';
import type { RunSummary } from '@/lib/schemas/runs';
import { formatDuration } from './time-words';

interface RunProgressProps {
  collaboration: string;
  run: RunSummary;
  canStop: boolean;
  /** The server's state has changed: ask again. */
  onChanged(): void;
}

/** The stages that a run goes through, in their order. */
const stages = [
  { key: 'collect', label: 'Stars and overlaps' },
  { key: 'combine', label: 'Maps of shared stars' },
  { key: 'integrate', label: 'Completeness maps' },
  { key: 'posterior', label: 'Posterior and limits' },
  { key: 'store', label: 'Storing the result' },
];

function stageState(job: JobView, index: number): 'done' | 'running' | 'waiting' {
  if (job.status === 'waiting') return 'waiting';
  const here = stages.findIndex((stage) => stage.key === job.stage);
  if (index < here) return 'done';
  return index === here ? 'running' : 'waiting';
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
      {stages.map((stage, index) => {
        const state = stageState(job, index);
        const isHere = state === 'running' || (isWaiting && index === 0);
        return (
          <ProgressLine
            key={stage.key}
            label={stage.label}
            accessibleName={`Run ${run.number}, ${stage.label}`}
            done={state === 'running' ? job.done : state === 'done' ? 1 : 0}
            total={state === 'running' ? job.total : 1}
            state={state}
            time={
              state === 'running' && job.timeLeftS !== null
                ? `about ${formatDuration(job.timeLeftS)} left`
                : ''
            }
            action={
              isHere && canStop ? (
                <Button
                  size="small"
                  className="min-w-[50px]"
                  onClick={stop}
                  isBusy={isStopping || job.cancelRequested}
                >
                  {job.cancelRequested ? 'Stopping' : 'Stop'}
                </Button>
              ) : (
                // Keeps the columns of all stages under each other.
                <span className="w-[50px]" />
              )
            }
          />
        );
      })}
      <p className="mt-2 text-ink3 text-note">
        {isWaiting
          ? `Run ${run.number} waits for a worker.`
          : `Run ${run.number} is computed by the workers.`}{' '}
        You may leave; the result is kept.
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
