import dynamic from 'next/dynamic';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { isOnItsWay } from './run-standing';

const RunEnded = dynamic(async () => (await import('./run-progress')).RunEnded);
const RunProgress = dynamic(async () => (await import('./run-progress')).RunProgress);

/** Few results need one of these. */
const RunCaveats = dynamic(async () => (await import('./run-caveats')).RunCaveats);

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
  const isOfOlderQuestion = analysis.state === 'changed' && needsRun;
  const hasCaveats = run?.hasOlderInputs || isOfOlderQuestion || (run?.withdrawn ?? []).length > 0;
  const shared = { collaboration, canStop: analysis.can.run, onChanged };
  return (
    <div className="grid gap-3 empty:hidden [&:not(:empty)]:mb-4">
      {isOnItsWay(newest) && <RunProgress run={newest} {...shared} />}
      {hasEnded && <RunEnded run={newest} {...shared} />}
      {run && hasCaveats && <RunCaveats run={run} isOfOlderQuestion={isOfOlderQuestion} />}
    </div>
  );
}
