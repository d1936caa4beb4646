'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { withdrawShare } from '@/components/hooks/use-sharing';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import type { ShareView } from '@/lib/schemas/sharing';

const DAY_MS = 86_400_000;
const tomorrow = () => new Date(Date.now() + DAY_MS).toISOString().slice(0, 10);

interface WithdrawShareDialogProps {
  collaboration: string;
  share: ShareView;
  onClose(): void;
  onWithdrawn(): void;
}

/** Asks from when, and why; both are read on the other side. */
export function WithdrawShareDialog(props: WithdrawShareDialogProps) {
  const { collaboration, share, onClose, onWithdrawn } = props;
  const [why, setWhy] = useState(share.withdrawnWhy ?? '');
  const [from, setFrom] = useState('');
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const isOffer = share.copiedAt === null;
  const withdraw = () =>
    perform(async () => {
      const body = { why: why.trim(), ...(from !== '' && { from }) };
      await withdrawShare(collaboration, share.id, body);
      onWithdrawn();
      onClose();
    });
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={isOffer ? `Take back ${share.survey.name}` : `Withdraw ${share.survey.name}`}
      actions={
        <>
          <Button
            variant="primary"
            isBusy={isBusy}
            disabledReason={why.trim() === '' ? 'State the reason; both sides read it' : undefined}
            onClick={() => void withdraw()}
          >
            {isOffer ? 'Take it back' : 'Withdraw it'}
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </>
      }
    >
      <div className="grid gap-3">
        <p className="text-ink2">
          {isOffer
            ? `${share.other} has not accepted it yet: nothing of it is with them.`
            : `From that day nothing new of ${share.other} may use it. Runs that they have made stand with their attribution, marked as resting on a survey that was withdrawn.`}
        </p>
        {!isOffer && (
          <TextField
            label="First day without it"
            hint="UTC; at once if left empty"
            type="date"
            min={tomorrow()}
            value={from}
            onChange={(event) => setFrom(event.target.value)}
          />
        )}
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
