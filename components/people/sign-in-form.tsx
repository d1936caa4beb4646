'use client';

import Link from 'next/link';
import { useState } from 'react';
import { startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';

/** E-mail and password; on success the browser goes to `next`, an address of this site. */
export function SignInForm({ next }: { next: string }) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const submit = async (form: FormData) => {
    setBusy(true);
    setRefusal(null);
    const sentence = await startSession(String(form.get('email')), String(form.get('password')));
    if (sentence === null) window.location.assign(next);
    else {
      setRefusal(sentence);
      setBusy(false);
    }
  };
  return (
    <form
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void submit(new FormData(event.currentTarget));
      }}
    >
      <TextField label="E-mail" name="email" type="email" autoComplete="username" required />
      <PasswordField label="Password" name="password" autoComplete="current-password" required />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Sign in
      </Button>
      <p className="text-[14px] text-ink3">
        Invited by a collaboration? Open the link in the invitation. No account yet?{' '}
        <Link className="underline underline-offset-3" href="/sign-up">
          Make one
        </Link>
        .
      </p>
    </form>
  );
}
