'use client';

import { type FormEvent, useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { startSessionByLink } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';
import { SecondFactorField } from './second-factor-field';

/** Asks once, so that a program which follows links in mail uses none of them up. */
export function LinkSignIn({ code }: { code: string }) {
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const [isCodeAsked, setCodeAsked] = useState(false);
  const [secondFactor, setSecondFactor] = useState('');
  const enter = (event: FormEvent) => {
    event.preventDefault();
    void perform(async () => {
      const sentence = await startSessionByLink(code, isCodeAsked ? secondFactor : undefined);
      if (sentence === null) return window.location.assign('/');
      if (sentence === CODE_IS_ASKED) setCodeAsked(true);
      throw new Error(sentence);
    });
  };
  return (
    <form className="flex flex-col gap-4" onSubmit={enter}>
      {isCodeAsked && <SecondFactorField value={secondFactor} onChange={setSecondFactor} />}
      {problem !== undefined && problem !== CODE_IS_ASKED && (
        <Notice tone="bad" title={problem} isAnnounced />
      )}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Sign in
      </Button>
    </form>
  );
}
