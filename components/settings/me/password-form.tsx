'use client';

import { type FormEvent, useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { changePassword } from '@/components/hooks/use-me';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';

/** A new password; every other session ends with it. */
export function PasswordForm({ onChanged }: { onChanged(): void }) {
  const { perform, isBusy, problem } = useAction();
  const [isSaved, setSaved] = useState(false);
  const save = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = event.currentTarget;
    const given = new FormData(form);
    setSaved(false);
    void perform(async () => {
      await changePassword(String(given.get('current')), String(given.get('next')));
      form.reset();
      setSaved(true);
      onChanged();
    });
  };
  return (
    <form className="flex max-w-[440px] flex-col gap-4" onSubmit={save}>
      <PasswordField
        label="Your password now"
        name="current"
        autoComplete="current-password"
        required
      />
      <PasswordField
        label="New password"
        name="next"
        hint="At least 15 characters, or 8 beside a second factor; a few words that belong together for nobody else"
        autoComplete="new-password"
        minLength={8}
        maxLength={128}
        required
      />
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      {isSaved && (
        <Notice tone="ok" title="The new password holds." isAnnounced>
          Every other session has ended.
        </Notice>
      )}
      <div>
        <Button type="submit" isBusy={isBusy}>
          Change the password
        </Button>
      </div>
    </form>
  );
}
