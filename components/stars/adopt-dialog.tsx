'use client';

import { type ReactNode, useEffect, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import { adoptValues, previewAdoption } from '@/components/hooks/use-adoption';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import type { AdoptionChoices, AdoptMany } from '@/lib/schemas/stars';
import { previewWords } from './preview-words';

interface AdoptDialogProps {
  collaboration: string;
  title: string;
  /** What would be adopted; null while the form above the preview is not complete. */
  choices: AdoptionChoices | null;
  /** What is missing from the form. */
  missing?: string;
  /** The form, or what follows. */
  children: ReactNode;
  onClose(): void;
  onAdopted(): void;
}

/** Shows how the lead limit would move, asks for the reason, and makes a new table. */
export function AdoptDialog(props: AdoptDialogProps) {
  const { collaboration, title, choices, missing, children, onClose, onAdopted } = props;
  const [why, setWhy] = useState('');
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const adopt = async () => {
    if (choices === null) return;
    await perform(async () => {
      await adoptValues(collaboration, { ...choices, why: why.trim() } as AdoptMany);
      onAdopted();
      onClose();
    });
  };
  const lacking =
    choices === null
      ? missing
      : why.trim() === ''
        ? 'State the reason; it is kept with the table'
        : undefined;
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={title}
      actions={
        <>
          <Button
            variant="primary"
            isBusy={isBusy}
            disabledReason={lacking}
            onClick={() => void adopt()}
          >
            Make a new table
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </>
      }
    >
      <div className="grid gap-3">
        {children}
        <LimitPreview collaboration={collaboration} choices={choices} />
        <TextField
          label="Reason"
          value={why}
          maxLength={300}
          onChange={(event) => setWhy(event.target.value)}
        />
        {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      </div>
    </Dialog>
  );
}

/** Long enough that a number being typed is not asked for digit by digit. */
const PAUSE_MS = 500;

/** How the lead limit would move under what is chosen. */
function LimitPreview({
  collaboration,
  choices,
}: {
  collaboration: string;
  choices: AdoptionChoices | null;
}) {
  const asked = choices === null ? null : JSON.stringify(choices);
  const [told, setTold] = useState<{ asked: string; words: string } | null>(null);
  useEffect(() => {
    if (asked === null) return;
    let isShown = true;
    const timer = setTimeout(() => {
      previewAdoption(collaboration, JSON.parse(asked) as AdoptionChoices).then(
        (preview) => isShown && setTold({ asked, words: previewWords(preview) }),
        (failure: unknown) => isShown && setTold({ asked, words: sentenceOf(failure) }),
      );
    }, PAUSE_MS);
    return () => {
      isShown = false;
      clearTimeout(timer);
    };
  }, [collaboration, asked]);
  if (asked === null) return null;
  return (
    <p role="status" className="rounded bg-well px-3 py-2 text-ink2 text-note">
      {told?.asked === asked ? told.words : 'Computing how the lead limit would move'}
    </p>
  );
}
