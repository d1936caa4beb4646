'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { copyAnalysis } from '@/components/hooks/use-analyses';
import { startRun } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LinkButton } from '@/components/ui/link-button';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { ExportMenu } from './export-menu';
import type { LiveSetting } from './live-setting';
import { copyAndRun, saveAndRun } from './save-setting';

interface ResultActionsProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run. */
  run?: RunSummary;
  setting: LiveSetting;
  isUnsaved: boolean;
  /** A run is on its way. */
  isBusy: boolean;
  /** At the foot of a narrow screen only what a thumb needs. */
  placement: 'head' | 'foot';
  onUndo(): void;
  onSaved(): void;
}

type Work = 'save' | 'copy' | 'run';

/** What becomes of a change, and what may be done with a result. */
export function ResultActions(props: ResultActionsProps) {
  const { collaboration, analysis, run, setting, isUnsaved, isBusy, onUndo, onSaved } = props;
  const isFoot = props.placement === 'foot';
  const router = useRouter();
  const [work, setWork] = useState<Work>();
  const [problem, setProblem] = useState<string>();
  const mayChange = analysis.can.change && analysis.can.run;
  const next = (analysis.runs[0]?.number ?? 0) + 1;

  const perform = async (kind: Work, task: () => Promise<string | undefined>) => {
    setWork(kind);
    setProblem(undefined);
    try {
      const key = await task();
      if (key !== undefined) router.push(`/${collaboration}/analyses/${key}`);
      else onSaved();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setWork(undefined);
    }
  };
  const save = () =>
    perform('save', async () => {
      await saveAndRun(collaboration, analysis, setting);
      return undefined;
    });
  const saveCopy = () => perform('copy', () => copyAndRun(collaboration, analysis, setting));
  const copy = () =>
    perform('copy', async () => (await copyAnalysis(collaboration, analysis.key)).key);
  const runAgain = () =>
    perform('run', async () => {
      await startRun(collaboration, analysis.key);
      return undefined;
    });
  const wait = isBusy ? 'A run is on its way: wait for it or stop it first.' : undefined;

  return (
    <>
      {isUnsaved ? (
        <>
          <Button icon="undo" onClick={onUndo} className={isFoot ? '' : 'max-md:hidden'}>
            {isFoot ? <span className="sr-only">Undo</span> : 'Undo'}
          </Button>
          {analysis.can.copy && !(isFoot && mayChange) && (
            <Button
              icon="copy"
              variant={mayChange ? 'normal' : 'primary'}
              onClick={saveCopy}
              isBusy={work === 'copy'}
            >
              Save as copy
            </Button>
          )}
          {mayChange && (
            <Button
              variant="primary"
              className={isFoot ? '' : 'max-md:hidden'}
              onClick={save}
              isBusy={work === 'save'}
              disabledReason={wait}
            >
              {isFoot ? `Run ${next}` : `Save as run ${next}`}
            </Button>
          )}
        </>
      ) : (
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
              disabledReason={
                mayChange
                  ? wait
                  : 'Only whoever made this analysis, a statistician, an author or an owner can run it. Copy it and run the copy.'
              }
            >
              {needsRun(analysis, run) ? `Run ${next}` : 'Run again'}
            </Button>
          )}
        </>
      )}
      <Dialog
        isOpen={problem !== undefined}
        onClose={() => setProblem(undefined)}
        title="It was not done"
        actions={
          <Button variant="primary" onClick={() => setProblem(undefined)}>
            Back to the result
          </Button>
        }
      >
        <p>{problem}</p>
      </Dialog>
    </>
  );
}

function needsRun(analysis: AnalysisView, run: RunSummary): boolean {
  return analysis.state === 'changed' || analysis.state === 'failed' || run.hasOlderInputs;
}

function compareAddress(collaboration: string, analysis: AnalysisView): string {
  const keys = [analysis.parent, analysis.key].filter(Boolean).join();
  return `/${collaboration}/compare?with=${keys}`;
}
