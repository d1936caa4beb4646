'use client';

import { useState } from 'react';
import { askLink } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import type { LinkPurpose } from '@/lib/schemas/account-access';

const loadSchema = async () =>
  (await import('@/lib/schemas/account-access')).askLinkSchema.pick({ email: true });

const words: Record<LinkPurpose, { button: string; works: string }> = {
  'password-reset': { button: 'Send the link', works: 'It works once, for 30 minutes.' },
  'sign-in': { button: 'Send the link', works: 'It works once, for 15 minutes.' },
};

/** Asks for a link by e-mail; what is said afterwards does not tell whether there is an account. */
export function AskLinkForm({ purpose }: { purpose: LinkPurpose }) {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { field, submit, refusal, isBusy } = useSchemaForm(loadSchema, { email: '' });
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async ({ email }) => {
        setSentTo(null);
        await askLink(email, purpose);
        setSentTo(email);
      })}
    >
      <TextField label="E-mail" type="email" autoComplete="username" required {...field('email')} />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {sentTo !== null && (
        <Notice tone="ok" title="Look into your mail." isAnnounced>
          If {sentTo} has an account, a link is on its way. {words[purpose].works}
        </Notice>
      )}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        {words[purpose].button}
      </Button>
      <p className="text-[14px] text-ink3">
        <Link className="underline underline-offset-3" href="/sign-in">
          Sign in with your password
        </Link>
      </p>
    </form>
  );
}
