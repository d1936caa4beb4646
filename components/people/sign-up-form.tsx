'use client';

import Link from 'next/link';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { signUp, startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';

/** Makes an account and signs it in; the collaboration comes on the next page. */
export function SignUpForm() {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const submit = async (form: FormData) => {
    const account = {
      name: String(form.get('name')),
      email: String(form.get('email')),
      password: String(form.get('password')),
    };
    setBusy(true);
    setRefusal(null);
    try {
      await signUp(account);
      const sentence = await startSession(account.email, account.password);
      if (sentence !== null) throw new Error(sentence);
      window.location.assign('/welcome');
    } catch (reason) {
      setRefusal(sentenceOf(reason));
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
      <TextField label="Name" name="name" autoComplete="name" required maxLength={100} />
      <TextField label="E-mail" name="email" type="email" autoComplete="username" required />
      <PasswordField
        label="Password"
        name="password"
        autoComplete="new-password"
        hint="At least 15 characters; four or five words that do not belong together do well."
        required
        minLength={15}
        maxLength={128}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Make the account
      </Button>
      <p className="text-[14px] text-ink3">
        Have one already?{' '}
        <Link className="underline underline-offset-3" href="/sign-in">
          Sign in
        </Link>
        .
      </p>
    </form>
  );
}
