'use client';

import { type ReactNode, useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

interface ReasonDialogProps {
  title: string;
  /** What follows from it. */
  children: ReactNode;
  action: string;
  /** Why it cannot be done yet, beside a missing reason. */
  missing?: string | undefined;
  onClose(): void;
  /** Does it; a refusal is shown. */
  onDecide(why: string): Promise<void>;
}

/** Asks for the reason of a decision that others will read. */
export function ReasonDialog({
  title,
  children,
  action,
  missing,
  onClose,
  onDecide,
}: ReasonDialogProps) {
  const [why, setWhy] = useState('');
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const decide = () =>
    perform(async () => {
      await onDecide(why.trim());
      onClose();
    });
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
            disabledReason={
              missing ?? (why.trim() === '' ? 'State the reason; it is kept in the log' : undefined)
            }
            onClick={() => void decide()}
          >
            {action}
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </>
      }
    >
      <div className="mb-3 text-ink2">{children}</div>
      <TextField
        label="Reason"
        value={why}
        maxLength={300}
        onChange={(event) => setWhy(event.target.value)}
      />
      {problem !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title={problem} isAnnounced />
        </div>
      )}
    </Dialog>
  );
}
