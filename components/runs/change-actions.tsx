'use client';

import { useState } from 'react';
import { useEditing } from '@/components/hooks/use-editing';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import type { LiveSetting } from './live-setting';
import { recipeWords } from './recipe-words';
import { HELD, type KeptActionsProps, mayChange, nextNumber, useWork, WAIT } from './result-work';
import { sharedVersion } from './shared-version';

export interface ChangeActionsProps extends KeptActionsProps {
  /** The setting at the moment of the press: it moves too often to be handed down. */
  settingNow(): LiveSetting;
  /** It asks for other ages or another cooling model, which no run can have. */
  isWhatIf: boolean;
  onUndo(): void;
}

const WHAT_IF =
  'Other ages and cooling models are looked at here and recorded with their own question. To make a run of them, adopt ages under Stars or give the surveys the cooling model.';

/** Loaded with the first press: a page that is read pays nothing for it. */
const saving = () => import('./save-setting');

/** What becomes of a change: loaded with the first one. */
export function ChangeActions(props: ChangeActionsProps) {
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
      const { recipeOf, saveAndRun } = await saving();
      const mine = await recipeOf(editing.opened(), setting);
      const isStored = await editing.attempt(mine, (recipe) =>
        saveAndRun(collaboration, { ...analysis, recipe }, setting),
      );
      return isStored ? undefined : HELD;
    });
  const saveCopy = () =>
    perform('copy', async () => (await saving()).copyAndRun(collaboration, analysis, settingNow()));
  const [asked, setAsked] = useState<{ population: string; go(): Promise<void> }>();
  /** A version of what all others use too is not made unasked. */
  const ask = (go: () => Promise<void>) => async () => {
    const population = sharedVersion(analysis, settingNow());
    if (population === undefined) await go();
    else setAsked({ population, go });
  };
  return (
    <>
      <Button icon="undo" onClick={onUndo} className={isFoot ? '' : 'max-md:hidden'}>
        {isFoot ? <span className="sr-only">Undo</span> : 'Undo'}
      </Button>
      {analysis.can.copy && !(isFoot && isOwn) && (
        <Button
          icon="copy"
          variant={isOwn ? 'normal' : 'primary'}
          onClick={ask(saveCopy)}
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
          onClick={ask(save)}
          isBusy={work === 'save'}
          disabledReason={whatIf ?? (isBusy ? WAIT : undefined)}
        >
          {isFoot ? `Run ${next}` : `Save as run ${next}`}
        </Button>
      )}
      {dialog}
      <Dialog
        isOpen={asked !== undefined}
        onClose={() => setAsked(undefined)}
        title={`Also save a version of ${asked?.population}?`}
        actions={
          <>
            <Button onClick={() => setAsked(undefined)}>Back to the result</Button>
            <Button
              variant="primary"
              onClick={() => {
                setAsked(undefined);
                void asked?.go();
              }}
            >
              Save version and run
            </Button>
          </>
        }
      >
        <p>
          Ranges and indices belong to the population. {asked?.population} is shared with all: its
          newest version will hold the ones set here. Analyses keep the version that they name.
        </p>
      </Dialog>
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
