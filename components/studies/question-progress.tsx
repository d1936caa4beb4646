'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { cancelJob, retryJob } from '@/components/hooks/use-runs';
import { removeStudy } from '@/components/hooks/use-studies';
import { formatDuration } from '@/components/runs/time-words';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { ProgressLine } from '@/components/ui/progress-line';
import { TextAction } from '@/components/ui/text-action';
import type { StudySummary } from '@/lib/schemas/studies';

interface QuestionProgressProps {
  collaboration: string;
  study: StudySummary;
  /** "Limit map", with its settings in words. */
  name: string;
  canStop: boolean;
  /** What mends a failure, where the kind knows. */
  mend?: string;
  onChanged(): void;
}

/** A question on its way: its stage, how far it is, and the way to stop it. */
export function QuestionProgress(props: QuestionProgressProps) {
  const { collaboration, study, name, canStop, onChanged } = props;
  const { job } = study;
  const { perform, isBusy, problem } = useJobAction(onChanged);
  const isWaiting = job.status === 'waiting';
  return (
    <section aria-label={`${name}, on its way`} aria-live="polite">
      <ProgressLine
        label={isWaiting ? 'Waiting for a worker' : stageInWords(job.stage)}
        accessibleName={`Question ${study.number}, ${name}`}
        done={isWaiting ? 0 : job.done}
        total={isWaiting ? 1 : job.total}
        state={isWaiting ? 'waiting' : 'running'}
        time={job.timeLeftS === null ? '' : `about ${formatDuration(job.timeLeftS)} left`}
        action={
          canStop ? (
            <Button
              size="small"
              onClick={() => perform(() => cancelJob(collaboration, job.id))}
              isBusy={isBusy || job.cancelRequested}
            >
              {job.cancelRequested ? 'Stopping' : 'Stop'}
            </Button>
          ) : undefined
        }
      />
      <p className="mt-2 text-ink3 text-note">
        Question {study.number}, {name}. You may leave; the answer is kept.
      </p>
      {problem !== undefined && (
        <Notice tone="bad" title="It was not stopped." isAnnounced>
          {problem}
        </Notice>
      )}
    </section>
  );
}

interface QuestionEndedProps extends QuestionProgressProps {
  onDeleted(): void;
}

/** A question that ended without an answer: why, and what mends it. */
export function QuestionEnded(props: QuestionEndedProps) {
  const { collaboration, study, name, canStop, mend, onChanged, onDeleted } = props;
  const { perform, isBusy, problem } = useJobAction(onChanged);
  const deletion = useJobAction(onDeleted);
  const wasStopped = study.job.status === 'cancelled';
  const fault = study.job.fault ?? 'It gave no reason.';
  return (
    <Notice
      tone={wasStopped ? 'neutral' : 'bad'}
      title={`Question ${study.number}, ${name}, ${wasStopped ? 'was stopped' : 'has no answer'}.`}
      isAnnounced
      actions={
        <>
          {canStop && (
            <TextAction
              icon="undo"
              aria-disabled={isBusy}
              onClick={() => perform(() => retryJob(collaboration, study.job.id))}
            >
              {wasStopped ? 'Compute it after all' : 'Retry'}
            </TextAction>
          )}
          {study.can.remove && (
            <TextAction
              aria-disabled={deletion.isBusy}
              onClick={() => deletion.perform(() => removeStudy(collaboration, study.id))}
            >
              Delete the question
            </TextAction>
          )}
        </>
      }
    >
      {problem ??
        deletion.problem ??
        (wasStopped ? 'Nothing of it was stored.' : [fault, mend].filter(Boolean).join(' '))}
    </Notice>
  );
}

function useJobAction(onChanged: () => void) {
  const [isBusy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string>();
  const perform = async (action: () => Promise<unknown>) => {
    setBusy(true);
    setProblem(undefined);
    try {
      await action();
      onChanged();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setBusy(false);
    }
  };
  return { perform, isBusy, problem };
}

/** A stage's key as words: "limit-map" reads "Limit map". */
export function stageInWords(stage: string): string {
  const words = stage.replaceAll('-', ' ').trim();
  return words === '' ? 'Starting' : `${words[0].toUpperCase()}${words.slice(1)}`;
}
