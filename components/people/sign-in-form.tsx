'use client';

import { useState } from 'react';
import { leaveForOrcid, startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';
import { SecondFactorField } from './second-factor-field';

const loadSchema = async () => (await import('@/lib/schemas/people')).signInSchema;

/** E-mail and password; on success the browser goes to `next`, an address of this site. */
export function SignInForm({ next, hasOrcid }: { next: string; hasOrcid: boolean }) {
  const { field, submit, refusal, setRefusal, isBusy } = useSchemaForm(loadSchema, {
    email: '',
    password: '',
  });
  const [isCodeAsked, setCodeAsked] = useState(false);
  const [code, setCode] = useState('');
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async ({ email, password }) => {
        const sentence = await startSession(email, password, isCodeAsked ? code : undefined);
        if (sentence === CODE_IS_ASKED) setCodeAsked(true);
        if (sentence === null) window.location.assign(next);
        else setRefusal(sentence);
      })}
    >
      <TextField label="E-mail" type="email" autoComplete="username" required {...field('email')} />
      <PasswordField
        label="Password"
        autoComplete="current-password"
        required
        {...field('password')}
      />
      {isCodeAsked && <SecondFactorField value={code} onChange={setCode} />}
      {refusal !== null && refusal !== CODE_IS_ASKED && (
        <Notice tone="bad" title={refusal} isAnnounced />
      )}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Sign in
      </Button>
      {hasOrcid && (
        <Button type="button" isWide onClick={() => void leaveForOrcid('orcid', next)}>
          Sign in with ORCID
        </Button>
      )}
      <p className="flex flex-wrap gap-x-5 gap-y-1 text-[14px] text-ink3">
        <Link className="underline underline-offset-3" href="/reset">
          Forgotten the password?
        </Link>
        <Link className="underline underline-offset-3" href="/sign-in/link">
          Sign in by a link in your mail
        </Link>
      </p>
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
