'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from './button';
import { Notice } from './notice';
import { TextAction } from './text-action';

interface DeleteForGoodProps {
  /** "Delete the draft": what is asked for first. */
  label: string;
  /** What goes with it, as a sentence. */
  warning: string;
  onDelete(): Promise<void>;
  /** Leaves what is no more. */
  onDeleted(): void;
  /** Shows it as it is now: somebody may have changed it. */
  onRefused?(): void;
}

/** Deletes something once it was asked for twice. */
export function DeleteForGood(props: DeleteForGoodProps) {
  const { label, warning, onDelete, onDeleted, onRefused } = props;
  const [isAsked, setAsked] = useState(false);
  const { perform, isBusy, problem } = useAction();
  const remove = async () => {
    const isDone = await perform(async () => {
      await onDelete();
      onDeleted();
    });
    if (!isDone) onRefused?.();
  };

  if (!isAsked) {
    return (
      <Button variant="quiet" onClick={() => setAsked(true)}>
        {label}
      </Button>
    );
  }
  return (
    <div className="grid justify-items-start gap-2">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 text-note">
        {warning}
        <Button onClick={remove} isBusy={isBusy}>
          Delete it
        </Button>
        <TextAction onClick={() => setAsked(false)}>Keep it</TextAction>
      </div>
      {problem !== undefined && (
        <Notice tone="bad" title="Nothing was deleted." isAnnounced>
          {problem}
        </Notice>
      )}
    </div>
  );
}
