'use client';

import { useAction } from '@/components/hooks/use-action';
import { acceptOffer, startSession } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
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
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const accept = () =>
    perform(async () => {
      const { slug } = await acceptOffer(code);
      window.location.assign(`/${slug}`);
    });
  if (signedInAs === offer.email) {
    return (
      <div className="flex flex-col gap-4">
        {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
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
  return <NewAccount offer={offer} code={code} />;
}

const loadSchema = async () =>
  (await import('@/lib/schemas/people')).signUpSchema.pick({ name: true, password: true });

/** For somebody without an account: the address is the one that was invited. */
function NewAccount({ code, offer }: { code: string; offer: InvitationOffer }) {
  const { field, submit, refusal, isBusy } = useSchemaForm(loadSchema, { name: '', password: '' });
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async (account) => {
        const { slug } = await acceptOffer(code, account);
        const sentence = await startSession(offer.email, account.password);
        if (sentence !== null) throw new Error(sentence);
        window.location.assign(`/${slug}`);
      })}
    >
      <TextField label="Name" autoComplete="name" required {...field('name')} />
      <TextField label="E-mail" value={offer.email} readOnly autoComplete="username" />
      <PasswordField
        label="Password"
        autoComplete="new-password"
        hint="At least 15 characters; four or five words that do not belong together do well."
        required
        {...field('password')}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Make the account and join
      </Button>
    </form>
  );
}
