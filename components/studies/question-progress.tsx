'use client';

import { useAction } from '@/components/hooks/use-action';
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
  const { perform, isBusy, problem } = useAction();
  const stop = () =>
    perform(async () => {
      await cancelJob(collaboration, job.id);
      onChanged();
    });
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
            <Button size="small" onClick={stop} isBusy={isBusy || job.cancelRequested}>
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
  const retrying = useAction();
  const deletion = useAction();
  const retry = () =>
    retrying.perform(async () => {
      await retryJob(collaboration, study.job.id);
      onChanged();
    });
  const remove = () =>
    deletion.perform(async () => {
      await removeStudy(collaboration, study.id);
      onDeleted();
    });
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
            <TextAction icon="undo" aria-disabled={retrying.isBusy} onClick={retry}>
              {wasStopped ? 'Compute it after all' : 'Retry'}
            </TextAction>
          )}
          {study.can.remove && (
            <TextAction aria-disabled={deletion.isBusy} onClick={remove}>
              Delete the question
            </TextAction>
          )}
        </>
      }
    >
      {retrying.problem ??
        deletion.problem ??
        (wasStopped ? 'Nothing of it was stored.' : [fault, mend].filter(Boolean).join(' '))}
    </Notice>
  );
}

/** A stage's key as words: "limit-map" reads "Limit map". */
export function stageInWords(stage: string): string {
  const words = stage.replaceAll('-', ' ').trim();
  return words === '' ? 'Starting' : `${words[0].toUpperCase()}${words.slice(1)}`;
}
