'use client';

import { type FormEvent, useState } from 'react';
import { startSessionByLink } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';
import { SecondFactorField } from './second-factor-field';

/** Asks once, so that a program which follows links in mail uses none of them up. */
export function LinkSignIn({ code }: { code: string }) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isCodeAsked, setCodeAsked] = useState(false);
  const [secondFactor, setSecondFactor] = useState('');
  const [isBusy, setBusy] = useState(false);
  const enter = async (event: FormEvent) => {
    event.preventDefault();
    setBusy(true);
    setRefusal(null);
    const sentence = await startSessionByLink(code, isCodeAsked ? secondFactor : undefined);
    if (sentence === null) return window.location.assign('/');
    if (sentence === CODE_IS_ASKED) setCodeAsked(true);
    setRefusal(sentence);
    setBusy(false);
  };
  return (
    <form className="flex flex-col gap-4" onSubmit={(event) => void enter(event)}>
      {isCodeAsked && <SecondFactorField value={secondFactor} onChange={setSecondFactor} />}
      {refusal !== null && refusal !== CODE_IS_ASKED && (
        <Notice tone="bad" title={refusal} isAnnounced />
      )}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Sign in
      </Button>
    </form>
  );
}
