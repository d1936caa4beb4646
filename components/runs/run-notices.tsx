import dynamic from 'next/dynamic';
import { WithdrawnNotices } from '@/components/sharing/withdrawn-notice';
import { Notice } from '@/components/ui/notice';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { isOnItsWay } from './run-standing';

const RunEnded = dynamic(async () => (await import('./run-progress')).RunEnded);
const RunProgress = dynamic(async () => (await import('./run-progress')).RunProgress);

interface RunNoticesProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run. */
  run: RunSummary | undefined;
  /** The recipe asks for what no control can show: a new run has to be made. */
  needsRun: boolean;
  onChanged(): void;
}

/** What is under way, and what a reader must know before the number below. */
export function RunNotices({ collaboration, analysis, run, needsRun, onChanged }: RunNoticesProps) {
  const newest = analysis.runs[0];
  const hasEnded = newest?.job.status === 'failed' || newest?.job.status === 'cancelled';
  const shared = { collaboration, canStop: analysis.can.run, onChanged };
  return (
    <div className="grid gap-3 empty:hidden [&:not(:empty)]:mb-4">
      {isOnItsWay(newest) && <RunProgress run={newest} {...shared} />}
      {hasEnded && <RunEnded run={newest} {...shared} />}
      <WithdrawnNotices surveys={run?.withdrawn} />
      {run?.hasOlderInputs && (
        <Notice tone="warn" title="Made with older inputs.">
          Newer maps, companions or targets exist than run {run.number} used. It stays as it is; a
          new run would use them.
        </Notice>
      )}
      {analysis.state === 'changed' && run && needsRun && (
        <Notice tone="warn" title={`The question changed since run ${run.number}.`}>
          The number below is of run {run.number} until a new run is made.
        </Notice>
      )}
    </div>
  );
}
