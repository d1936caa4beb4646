import { WithdrawnNotices } from '@/components/sharing/withdrawn-notice';
import { Notice } from '@/components/ui/notice';
import type { RunSummary } from '@/lib/schemas/runs';

interface RunCaveatsProps {
  /** Newest finished run. */
  run: RunSummary;
  /** The recipe asks for something else by now, which no control can show. */
  isOfOlderQuestion: boolean;
}

/** What a reader must know of a run before its number. */
export function RunCaveats({ run, isOfOlderQuestion }: RunCaveatsProps) {
  return (
    <>
      <WithdrawnNotices surveys={run.withdrawn} />
      {run.hasOlderInputs && (
        <Notice tone="warn" title="Made with older inputs.">
          Newer maps, companions or targets exist than run {run.number} used. It stays as it is; a
          new run would use them.
        </Notice>
      )}
      {isOfOlderQuestion && (
        <Notice tone="warn" title={`The question changed since run ${run.number}.`}>
          The number below is of run {run.number} until a new run is made.
        </Notice>
      )}
    </>
  );
}
