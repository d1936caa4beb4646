import { StateMark } from '@/components/ui/state-mark';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';

/** Where an analysis stands, beside its key. */
export function AnalysisState({
  analysis,
  isUnsaved = false,
  run,
}: {
  analysis: AnalysisView;
  /** A control was moved and nothing has kept it. */
  isUnsaved?: boolean;
  /** Newest finished run. */
  run: RunSummary | undefined;
}) {
  if (isUnsaved) return <StateMark kind="unsaved">Unsaved change</StateMark>;
  switch (analysis.state) {
    case 'running':
      return <StateMark kind="running">Running</StateMark>;
    case 'failed':
      return <StateMark kind="bad">Draft, run {analysis.runs[0]?.number} failed</StateMark>;
    case 'changed':
      return <StateMark kind="unsaved">Draft, changed since run {run?.number}</StateMark>;
    case 'run':
      if (run?.frozen) {
        const words = run.frozen === 'released' ? 'Released' : 'Frozen';
        return (
          <StateMark kind={run.frozen}>
            {words}, run {run.number}
          </StateMark>
        );
      }
      return <StateMark kind="draft">Draft, run {run?.number}, all changes saved</StateMark>;
    case 'draft':
      return <StateMark kind="draft">Draft, no run yet</StateMark>;
  }
}
