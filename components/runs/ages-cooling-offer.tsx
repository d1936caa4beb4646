'use client';

import { useAction } from '@/components/hooks/use-action';
import { askStudy } from '@/components/hooks/use-studies';
import { questionAddress } from '@/components/studies/kind-words';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import { TextAction } from '@/components/ui/text-action';
import type { DrawnRun } from '@/lib/schemas/runs';
import type { StudySummary } from '@/lib/schemas/studies';
import { formatDuration } from './time-words';

interface AgesCoolingOfferProps {
  collaboration: string;
  run: DrawnRun;
  /** The newest question, while it has no answer. */
  open: StudySummary | undefined;
  canAsk: boolean;
  onAsked(): void;
}

/** In the place of the two controls, until their maps are kept with the run. */
export function AgesCoolingOffer(props: AgesCoolingOfferProps) {
  const { collaboration, run, open, canAsk, onAsked } = props;
  const { perform, isBusy, problem } = useAction();
  const ask = async () => {
    if (isBusy) return;
    await perform(async () => {
      await askStudy(collaboration, run.id, { kind: 'ages-cooling' });
      onAsked();
    });
  };
  const address = questionAddress(collaboration, run.analysis.key, 'ages-cooling');
  const isOnItsWay = open?.job.status === 'waiting' || open?.job.status === 'running';
  return (
    <div className="min-w-0 max-md:w-full" aria-live="polite">
      <p className="mb-1 text-ink2 text-note">Age shift and cooling model</p>
      <div className="flex min-h-8 flex-wrap items-center gap-x-3 text-note">
        {isOnItsWay ? (
          <StateMark kind="running">{progressWords(open)}</StateMark>
        ) : (
          canAsk && (
            <TextAction icon="add" onClick={ask} aria-busy={isBusy}>
              Make their maps
            </TextAction>
          )
        )}
        {problem !== undefined && <span className="text-bad">{problem}</span>}
        {problem === undefined && open?.job.status === 'failed' && (
          <StateMark kind="bad">none were made: {open.job.fault ?? 'it gave no reason'}</StateMark>
        )}
        {!canAsk && !isOnItsWay && (
          <span className="text-ink3">no maps are kept with this run yet</span>
        )}
        <Link className="max-md:min-h-11" href={address}>
          What it computes
        </Link>
      </div>
    </div>
  );
}

function progressWords({ job }: StudySummary): string {
  if (job.status === 'waiting') return 'waiting for a worker';
  const left = job.timeLeftS === null ? '' : `, about ${formatDuration(job.timeLeftS)} left`;
  return job.total > 1 ? `${job.done} of ${job.total}${left}` : 'starting';
}
