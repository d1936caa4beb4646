'use client';

import { signUp, startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';

const loadSchema = async () => (await import('@/lib/schemas/people')).signUpSchema;

/** Makes an account and signs it in; the collaboration comes on the next page. */
export function SignUpForm() {
  const { field, submit, refusal, isBusy } = useSchemaForm(loadSchema, {
    name: '',
    email: '',
    password: '',
  });
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async (account) => {
        await signUp(account);
        const sentence = await startSession(account.email, account.password);
        if (sentence !== null) throw new Error(sentence);
        window.location.assign('/welcome');
      })}
    >
      <TextField label="Name" autoComplete="name" required {...field('name')} />
      <TextField label="E-mail" type="email" autoComplete="username" required {...field('email')} />
      <PasswordField
        label="Password"
        autoComplete="new-password"
        hint="At least 15 characters; four or five words that do not belong together do well."
        required
        {...field('password')}
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
