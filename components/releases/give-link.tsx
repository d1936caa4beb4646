'use client';

import { useState } from 'react';
import { useSWRConfig } from 'swr';
import { apiPath } from '@/components/hooks/api-path';
import { useAction } from '@/components/hooks/use-action';
import { createGuestLink } from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import { CopyText } from './copy-text';

/** Gives a guest a private address; it is shown once. */
export function GiveLink({
  collaboration,
  opens,
  target,
}: {
  collaboration: string;
  /** "R-4", "A-31, run 18". */
  opens: string;
  target: { releaseId: string } | { runId: string };
}) {
  const { mutate } = useSWRConfig();
  const [isOpen, setOpen] = useState(false);
  const [label, setLabel] = useState('');
  const [days, setDays] = useState('60');
  const [address, setAddress] = useState<string>();
  const { perform, isBusy, problem, clear } = useAction();
  const close = () => {
    setOpen(false);
    setAddress(undefined);
    setLabel('');
    clear();
  };
  const give = () =>
    perform(async () => {
      const made = await createGuestLink(collaboration, { label, days: Number(days), ...target });
      setAddress(made.address);
      await mutate(apiPath(collaboration, 'guest-links'));
    });
  return (
    <>
      <Button icon="link" onClick={() => setOpen(true)}>
        Link for a guest
      </Button>
      <Dialog
        isOpen={isOpen}
        onClose={close}
        title={`A guest may read ${opens}`}
        actions={
          address === undefined ? (
            <>
              <Button variant="primary" onClick={() => void give()} isBusy={isBusy}>
                Make the link
              </Button>
              <Button onClick={close}>Leave it</Button>
            </>
          ) : (
            <Button variant="primary" onClick={close}>
              Done
            </Button>
          )
        }
      >
        {address === undefined ? (
          <div className="grid gap-3">
            <p className="text-ink2 text-note">
              Whoever has the address reads this and nothing else, without an account, and may write
              notes to you. You can end it at any time.
            </p>
            <TextField
              label="For whom"
              hint="such as referee 1"
              value={label}
              maxLength={100}
              onChange={(event) => setLabel(event.target.value)}
            />
            <TextField
              label="Ends after"
              trailing="days"
              inputMode="numeric"
              value={days}
              onChange={(event) => setDays(event.target.value)}
            />
            {problem !== undefined && (
              <Notice tone="bad" title="No link was made." isAnnounced>
                {problem}
              </Notice>
            )}
          </div>
        ) : (
          <div className="grid gap-3">
            <Notice tone="warn" title="Shown once.">
              Only its fingerprint is kept here; copy it now.
            </Notice>
            <p className="break-all rounded bg-well px-3 py-2 text-note">{address}</p>
            <CopyText text={address} label="Copy the address" />
          </div>
        )}
      </Dialog>
    </>
  );
}
