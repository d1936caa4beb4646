'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { cancelJob, retryJob } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { ProgressLine } from '@/components/ui/progress-line';
import { TextAction } from '@/components/ui/text-action';
import type { SurveyView } from '@/lib/schemas/surveys';

interface MapJobLineProps {
  collaboration: string;
  survey: SurveyView;
  onChanged(): void;
}

/** The maps on their way: count, time left, stop; afterwards what went wrong, if anything did. */
export function MapJobLine({ collaboration, survey, onChanged }: MapJobLineProps) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const job = survey.mapJob;
  const act = async (work: () => Promise<unknown>) => {
    setRefusal(null);
    try {
      await work();
      onChanged();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  const refused = refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />;
  if (!job) return refused;
  if (job.status === 'waiting' || job.status === 'running') {
    return (
      <div className="my-4">
        <ProgressLine
          label="Completeness maps"
          accessibleName={`Completeness maps of ${survey.name}`}
          done={job.done}
          total={job.total}
          state={job.status}
          time={
            job.timeLeftS === null
              ? undefined
              : `about ${Math.max(1, Math.round(job.timeLeftS))} s left`
          }
          action={
            survey.can.import && (
              <Button
                size="small"
                isBusy={job.cancelRequested}
                onClick={() => void act(() => cancelJob(collaboration, job.id))}
              >
                {job.cancelRequested ? 'Stopping' : 'Stop'}
              </Button>
            )
          }
        />
        {refused}
      </div>
    );
  }
  if (job.status === 'failed' || job.status === 'cancelled') {
    return (
      <div className="my-4">
        <Notice
          tone={job.status === 'failed' ? 'bad' : 'warn'}
          title={
            job.status === 'failed' ? 'The maps stopped.' : 'The maps were stopped by a person.'
          }
          actions={
            survey.can.import && (
              <TextAction onClick={() => void act(() => retryJob(collaboration, job.id))}>
                Go on
              </TextAction>
            )
          }
        >
          {job.fault ??
            `${survey.maps.ready} of ${survey.targets} are ready; going on computes the rest.`}
        </Notice>
        {refused}
      </div>
    );
  }
  return refused;
}
