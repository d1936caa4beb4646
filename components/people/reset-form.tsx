'use client';

import { useState } from 'react';
import { resetPassword } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';

const loadSchema = async () =>
  (await import('@/lib/schemas/account-access')).resetPasswordSchema.pick({ password: true });

/** A new password for the account that the link belongs to. */
export function ResetForm({ code, email }: { code: string; email: string }) {
  const [isDone, setDone] = useState(false);
  const { field, submit, refusal, isBusy } = useSchemaForm(loadSchema, { password: '' });
  if (isDone) {
    return (
      <div className="flex flex-col gap-4">
        <Notice tone="ok" title="The new password holds." isAnnounced>
          Every session of this account has ended.
        </Notice>
        <LinkButton href="/sign-in" variant="primary" isWide>
          Sign in
        </LinkButton>
      </div>
    );
  }
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async ({ password }) => {
        await resetPassword(code, password);
        setDone(true);
      })}
    >
      <TextField label="E-mail" value={email} readOnly autoComplete="username" />
      <PasswordField
        label="New password"
        autoComplete="new-password"
        hint="At least 15 characters, or 8 where you also sign in with a code; four or five words that do not belong together do well."
        required
        {...field('password')}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Set the new password
      </Button>
    </form>
  );
}
