'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
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
  const { perform, isBusy, problem, clear } = useAction();
  const [pressed, setPressed] = useState<'data' | 'delete'>();
  const [isAsking, setAsking] = useState(false);
  const [password, setPassword] = useState('');
  const fetchIt = () => {
    setPressed('data');
    void perform(async () => save(await fetchOwnData(), 'rarebound-my-data.json'));
  };
  const remove = () => {
    setPressed('delete');
    void perform(async () => {
      await deleteAccount(password);
      window.location.assign('/sign-in');
    });
  };
  const close = () => {
    setAsking(false);
    setPassword('');
    clear();
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
        <Button icon="download" onClick={fetchIt} isBusy={isBusy && pressed === 'data'}>
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
              onClick={remove}
              isBusy={isBusy && pressed === 'delete'}
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
