'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { createCollaboration } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

const slugFrom = (name: string) =>
  name
    .toLowerCase()
    .normalize('NFKD')
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 39);

/** Starts a collaboration, whose owner the person becomes. */
export function WelcomeForm() {
  const [name, setName] = useState('');
  const [ownSlug, setOwnSlug] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const slug = ownSlug ?? slugFrom(name);
  const submit = async () => {
    setBusy(true);
    setRefusal(null);
    try {
      const made = await createCollaboration({ name, slug });
      window.location.assign(`/${made.slug}`);
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
        void submit();
      }}
    >
      <TextField
        label="Name of the collaboration"
        value={name}
        onChange={(event) => setName(event.target.value)}
        required
        maxLength={100}
      />
      <TextField
        label="Its address"
        hint="Lower-case letters, digits and hyphens."
        value={slug}
        onChange={(event) => setOwnSlug(event.target.value)}
        required
        maxLength={39}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Start the collaboration
      </Button>
    </form>
  );
}
