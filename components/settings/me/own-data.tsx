'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { deleteAccount, fetchOwnData } from '@/components/hooks/use-leaving';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';

/** Hands a file to the browser. */
function save(file: Blob, name: string): void {
  const address = URL.createObjectURL(file);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}

/** What is stored about the person, and the end of the account. */
export function OwnData() {
  const [busy, setBusy] = useState<string>();
  const [problem, setProblem] = useState<string>();
  const [isAsking, setAsking] = useState(false);
  const [password, setPassword] = useState('');
  const perform = async (name: string, task: () => Promise<void>) => {
    setBusy(name);
    setProblem(undefined);
    try {
      await task();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
    setBusy(undefined);
  };
  const fetchIt = () =>
    perform('data', async () => save(await fetchOwnData(), 'rarebound-my-data.json'));
  const remove = () =>
    perform('delete', async () => {
      await deleteAccount(password);
      window.location.assign('/sign-in');
    });
  const close = () => {
    setAsking(false);
    setPassword('');
    setProblem(undefined);
  };
  const refusal = problem !== undefined && (
    <Notice tone="bad" title="It was not done." isAnnounced>
      {problem}
    </Notice>
  );
  return (
    <>
      <p className="mb-3 text-ink2">
        Profile, memberships, notes, entries of the log, tokens by name, and sessions, as JSON.
      </p>
      {!isAsking && refusal}
      <div className="flex flex-wrap gap-2">
        <Button icon="download" onClick={() => void fetchIt()} isBusy={busy === 'data'}>
          Fetch your data
        </Button>
        <Button variant="quiet" onClick={() => setAsking(true)}>
          Delete your account
        </Button>
      </div>
      <Dialog
        isOpen={isAsking}
        onClose={close}
        title="Delete your account?"
        actions={
          <>
            <Button
              variant="primary"
              onClick={() => void remove()}
              isBusy={busy === 'delete'}
              disabledReason={password === '' ? 'Give your password.' : undefined}
            >
              Delete it now
            </Button>
            <Button onClick={close}>Keep it</Button>
          </>
        }
      >
        <div className="grid gap-3">
          <p>
            You leave all your collaborations and every session and token ends. Your work stays
            there, by “a former member”. Your name stays where you signed a frozen run or a release,
            or are an author of one. This cannot be undone.
          </p>
          {refusal}
          <PasswordField
            label="Your password"
            value={password}
            onChange={(event) => setPassword(event.target.value)}
            autoComplete="current-password"
          />
        </div>
      </Dialog>
    </>
  );
}
