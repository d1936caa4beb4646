'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useEditing } from '@/components/hooks/use-editing';
import { changeName } from '@/components/hooks/use-me';
import { Button } from '@/components/ui/button';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

/** The name under which others see the person. */
export function ProfileForm({ initial, email }: { initial: string; email: string }) {
  const [name, setName] = useState(initial);
  const [stored, setStored] = useState(initial);
  const editing = useEditing(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isSaved, setSaved] = useState(false);
  const router = useRouter();
  const save = async () => {
    setRefusal(null);
    setSaved(false);
    try {
      await editing.attempt(name, async (opened) => {
        const { person } = await changeName(opened, name);
        editing.begin(person.name);
        setStored(person.name);
        setSaved(true);
        router.refresh();
      });
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <form
      className="flex max-w-[440px] flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void save();
      }}
    >
      <TextField
        label="Name"
        hint="As everybody in your collaborations reads it"
        value={name}
        maxLength={100}
        required
        autoComplete="name"
        onChange={({ target }) => setName(target.value)}
      />
      <p className="text-note">
        <span className="block text-ink2">E-mail</span>
        <span className="[overflow-wrap:anywhere]">{email}</span>
      </p>
      <ChangedNotice
        editing={editing}
        words={(text) => ({ Name: text })}
        onTake={(now) => {
          setName(now);
          setStored(now);
        }}
        onKeep={() => void save()}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {isSaved && <Notice tone="ok" title="Your name is saved." isAnnounced />}
      <div>
        <Button type="submit" disabledReason={name === stored ? 'Nothing is changed' : undefined}>
          Save
        </Button>
      </div>
    </form>
  );
}
