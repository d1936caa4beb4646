'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { acceptOffer, startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';
import type { InvitationOffer } from '@/lib/schemas/people';

interface JoinFormProps {
  code: string;
  offer: InvitationOffer;
  /** Address of whoever is signed in here, if anybody is. */
  signedInAs: string | null;
}

/** Accepts an invitation: as the person signed in, by signing in first, or with a new account. */
export function JoinForm({ code, offer, signedInAs }: JoinFormProps) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const accept = async (account?: { name: string; password: string }) => {
    setBusy(true);
    setRefusal(null);
    try {
      const { slug } = await acceptOffer(code, account);
      if (account) {
        const sentence = await startSession(offer.email, account.password);
        if (sentence !== null) throw new Error(sentence);
      }
      window.location.assign(`/${slug}`);
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      setBusy(false);
    }
  };
  const refused = refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />;
  if (signedInAs === offer.email) {
    return (
      <div className="flex flex-col gap-4">
        {refused}
        <Button variant="primary" isWide isBusy={isBusy} onClick={() => void accept()}>
          Join {offer.collaboration}
        </Button>
      </div>
    );
  }
  if (offer.hasAccount) {
    return (
      <div className="flex flex-col gap-4">
        <p className="text-ink2">
          {offer.email} has an account already
          {signedInAs === null ? '' : `; you are signed in as ${signedInAs}`}.
        </p>
        <LinkButton
          href={`/sign-in?next=${encodeURIComponent(`/join/${code}`)}`}
          variant="primary"
          isWide
        >
          Sign in as {offer.email}
        </LinkButton>
      </div>
    );
  }
  return (
    <form
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        const form = new FormData(event.currentTarget);
        void accept({ name: String(form.get('name')), password: String(form.get('password')) });
      }}
    >
      <TextField label="Name" name="name" autoComplete="name" required maxLength={100} />
      <TextField label="E-mail" value={offer.email} readOnly autoComplete="username" />
      <PasswordField
        label="Password"
        name="password"
        autoComplete="new-password"
        hint="At least 15 characters; four or five words that do not belong together do well."
        required
        minLength={15}
        maxLength={128}
      />
      {refused}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Make the account and join
      </Button>
    </form>
  );
}
