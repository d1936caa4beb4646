'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { ChangedMeanwhile } from '@/components/hooks/change';
import { changeMailPreference } from '@/components/hooks/use-settings';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { Notice } from '@/components/ui/notice';
import type { MailPreferences } from '@/lib/schemas/mail';
import { mailPreferenceWords } from '@/lib/schemas/mail-words';

/** Which mail the person gets; what concerns the account always comes. */
export function MailSwitches({ initial }: { initial: MailPreferences }) {
  const [{ preferences }, setPreferences] = useState(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const change = async (given: MailPreferences['preferences'][number]) => {
    setRefusal(null);
    try {
      setPreferences(await changeMailPreference(given));
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      // The other window stopped or wanted it already: the switch shows that now.
      if (reason instanceof ChangedMeanwhile) {
        setPreferences({
          preferences: preferences.map((one) =>
            one.kind === given.kind ? { ...one, isWanted: given.isWanted } : one,
          ),
        });
      }
    }
  };
  return (
    <fieldset className="flex max-w-[560px] flex-col gap-1.5">
      <legend className="mb-2 text-ink2 text-note">A message comes when</legend>
      {preferences.map(({ kind, isWanted }) => (
        <CheckboxField
          key={kind}
          label={mailPreferenceWords[kind].label}
          hint={mailPreferenceWords[kind].hint}
          checked={isWanted}
          onChange={({ target }) => void change({ kind, isWanted: target.checked })}
        />
      ))}
      <p className="mt-2 text-ink3 text-note">
        Invitations, links to sign in and links to set a password always come.
      </p>
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
    </fieldset>
  );
}
