'use client';

import dynamic from 'next/dynamic';
import { copyAnalysis } from '@/components/hooks/use-analyses';
import { startRun } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import type { ChangeActionsProps } from './change-actions';
import { ExportMenu } from './export-menu';
import { type KeptActionsProps, mayChange, nextNumber, useWork, WAIT } from './result-work';

// With a waiting picture of its own it does not hold up the change that it is loaded for.
const ChangeActions = dynamic(async () => (await import('./change-actions')).ChangeActions, {
  loading: () => null,
});

interface ResultActionsProps extends ChangeActionsProps {
  isUnsaved: boolean;
}

/** What becomes of a change, and what may be done with a result. */
export function ResultActions(props: ResultActionsProps) {
  const { settingNow, isWhatIf, isUnsaved, onUndo, ...kept } = props;
  return isUnsaved ? (
    <ChangeActions {...kept} {...{ settingNow, isWhatIf, onUndo }} />
  ) : (
    <KeptActions {...kept} />
  );
}

/** What may be done with a result that no control has left. */
export function KeptActions(props: KeptActionsProps) {
  const { collaboration, analysis, run, isBusy, onSaved } = props;
  const isFoot = props.placement === 'foot';
  const { work, perform, dialog } = useWork(collaboration, onSaved);
  const copy = () =>
    perform('copy', async () => (await copyAnalysis(collaboration, analysis.key)).key);
  const runAgain = () =>
    perform('run', async () => {
      await startRun(collaboration, analysis.key);
      return undefined;
    });
  return (
    <>
      {analysis.can.copy && !isFoot && (
        <Button icon="copy" onClick={copy} isBusy={work === 'copy'}>
          Copy
        </Button>
      )}
      {run && (
        <span className={isFoot ? '' : 'max-md:hidden'}>
          <LinkButton href={compareAddress(collaboration, analysis)} icon="compare">
            {analysis.parent && !isFoot ? `Compare with ${analysis.parent}` : 'Compare'}
          </LinkButton>
        </span>
      )}
      {run && !isFoot && <ExportMenu collaboration={collaboration} run={run} />}
      {run && !isFoot && (
        <LinkButton
          href={`/${collaboration}/releases/freeze/${run.id}`}
          icon={run.frozen === 'released' ? 'diamond' : 'lock'}
        >
          {run.frozen === null ? 'Freeze' : run.frozen === 'frozen' ? 'Frozen' : 'Released'}
        </LinkButton>
      )}
      {run && (!isFoot || needsRun(analysis, run)) && (
        <Button
          variant={needsRun(analysis, run) ? 'primary' : 'normal'}
          onClick={runAgain}
          isBusy={work === 'run'}
          disabledReason={whyNot(analysis, isBusy)}
        >
          {needsRun(analysis, run) ? `Run ${nextNumber(analysis)}` : 'Run again'}
        </Button>
      )}
      {dialog}
    </>
  );
}

function whyNot(analysis: AnalysisView, isBusy: boolean): string | undefined {
  if (!mayChange(analysis)) {
    return 'Only whoever made this analysis, a statistician, an author or an owner can run it. Copy it and run the copy.';
  }
  return isBusy ? WAIT : undefined;
}

function needsRun(analysis: AnalysisView, run: RunSummary): boolean {
  return analysis.state === 'changed' || analysis.state === 'failed' || run.hasOlderInputs;
}

function compareAddress(collaboration: string, analysis: AnalysisView): string {
  const keys = [analysis.parent, analysis.key].filter(Boolean).join();
  return `/${collaboration}/compare?with=${keys}`;
}
