'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { copyAnalysis } from '@/components/hooks/use-analyses';
import { useEditing } from '@/components/hooks/use-editing';
import { startRun } from '@/components/hooks/use-runs';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { LinkButton } from '@/components/ui/link-button';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { ExportMenu } from './export-menu';
import type { LiveSetting } from './live-setting';
import { recipeWords } from './recipe-words';
import { copyAndRun, recipeOf, saveAndRun } from './save-setting';

interface KeptActionsProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run. */
  run?: RunSummary;
  /** A run is on its way. */
  isBusy: boolean;
  /** At the foot of a narrow screen only what a thumb needs. */
  placement: 'head' | 'foot';
  onSaved(): void;
}

interface ResultActionsProps extends KeptActionsProps {
  /** The setting at the moment of the press: it moves too often to be handed down. */
  settingNow(): LiveSetting;
  /** It asks for other ages or another cooling model, which no run can have. */
  isWhatIf: boolean;
  isUnsaved: boolean;
  onUndo(): void;
}

const WAIT = 'A run is on its way: wait for it or stop it first.';
const WHAT_IF =
  'Other ages and cooling models are looked at here and recorded with their own question. To make a run of them, adopt ages under Stars or give the surveys the cooling model.';
const mayChange = ({ can }: AnalysisView) => can.change && can.run;
const nextNumber = ({ runs }: AnalysisView) => (runs[0]?.number ?? 0) + 1;

/** What becomes of a change, and what may be done with a result. */
export function ResultActions(props: ResultActionsProps) {
  const { settingNow, isWhatIf, isUnsaved, onUndo, ...kept } = props;
  return isUnsaved ? (
    <ChangeActions {...kept} {...{ settingNow, isWhatIf, onUndo }} />
  ) : (
    <KeptActions {...kept} />
  );
}

type Work = 'save' | 'copy' | 'run';
/** In place of a key: nothing was stored, and the person decides. */
const HELD = Symbol('held');

/** One piece of work at a time; a key that it answers is where the person goes on. */
function useWork(collaboration: string, onSaved: () => void) {
  const router = useRouter();
  const [work, setWork] = useState<Work>();
  const [problem, setProblem] = useState<string>();
  const perform = async (kind: Work, task: () => Promise<string | typeof HELD | undefined>) => {
    setWork(kind);
    setProblem(undefined);
    try {
      const key = await task();
      if (key === HELD) return;
      if (key !== undefined) router.push(`/${collaboration}/analyses/${key}`);
      else onSaved();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setWork(undefined);
    }
  };
  const dialog = (
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
  );
  return { work, perform, dialog };
}

function ChangeActions(props: Omit<ResultActionsProps, 'isUnsaved'>) {
  const { collaboration, analysis, settingNow, isBusy, onUndo, onSaved } = props;
  const isFoot = props.placement === 'foot';
  const { work, perform, dialog } = useWork(collaboration, onSaved);
  const isOwn = mayChange(analysis);
  const whatIf = props.isWhatIf ? WHAT_IF : undefined;
  const next = nextNumber(analysis);
  // Drawn from the first change on: this recipe is the one that the change began from.
  const editing = useEditing(analysis.recipe);
  const save = () =>
    perform('save', async () => {
      const setting = settingNow();
      const mine = await recipeOf(editing.opened(), setting);
      const isStored = await editing.attempt(mine, (recipe) =>
        saveAndRun(collaboration, { ...analysis, recipe }, setting),
      );
      return isStored ? undefined : HELD;
    });
  const saveCopy = () => perform('copy', () => copyAndRun(collaboration, analysis, settingNow()));
  return (
    <>
      <Button icon="undo" onClick={onUndo} className={isFoot ? '' : 'max-md:hidden'}>
        {isFoot ? <span className="sr-only">Undo</span> : 'Undo'}
      </Button>
      {analysis.can.copy && !(isFoot && isOwn) && (
        <Button
          icon="copy"
          variant={isOwn ? 'normal' : 'primary'}
          onClick={saveCopy}
          isBusy={work === 'copy'}
          disabledReason={whatIf}
        >
          Save as copy
        </Button>
      )}
      {isOwn && (
        <Button
          variant="primary"
          className={isFoot ? '' : 'max-md:hidden'}
          onClick={save}
          isBusy={work === 'save'}
          disabledReason={whatIf ?? (isBusy ? WAIT : undefined)}
        >
          {isFoot ? `Run ${next}` : `Save as run ${next}`}
        </Button>
      )}
      {dialog}
      <Dialog
        isOpen={editing.conflict !== null}
        onClose={editing.leave}
        title={`${analysis.key} is another one by now`}
        actions={<Button onClick={editing.leave}>Back to the result</Button>}
      >
        <ChangedNotice
          editing={editing}
          words={(recipe) => recipeWords(recipe, analysis)}
          onTake={() => {
            editing.leave();
            onUndo();
            onSaved();
          }}
          onKeep={() => void save()}
        />
      </Dialog>
    </>
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
