'use client';

import type { FormEvent, ReactNode } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { PasswordField } from '@/components/ui/password-field';
import { TextField } from '@/components/ui/text-field';

/** Where the code of an authenticator, or a recovery code, is typed. */
export function CodeField({ hint }: { hint?: string }) {
  return (
    <TextField
      label="Code"
      name="code"
      hint={hint ?? 'Six digits of your authenticator, or a recovery code'}
      autoComplete="one-time-code"
      autoCapitalize="none"
      spellCheck={false}
      maxLength={40}
      required
    />
  );
}

export function OwnPasswordField() {
  return (
    <PasswordField
      label="Your password"
      name="password"
      autoComplete="current-password"
      maxLength={128}
      required
    />
  );
}

interface FactorFormProps {
  button: string;
  onSend(given: { password: string; code: string }): Promise<void>;
  children: ReactNode;
}

/** One step of the second factor: fields, a button, and what was refused. */
export function FactorForm({ button, onSend, children }: FactorFormProps) {
  const { perform, isBusy, problem } = useAction();
  const send = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const text = (name: string) => String(given.get(name) ?? '');
    void perform(() => onSend({ password: text('password'), code: text('code') }));
  };
  return (
    <form className="flex flex-col gap-4" onSubmit={send}>
      {children}
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      <div>
        <Button type="submit" isBusy={isBusy}>
          {button}
        </Button>
      </div>
    </form>
  );
}

/** Codes that are shown this once. */
export function RecoveryCodes({ codes, onKept }: { codes: string[]; onKept(): void }) {
  return (
    <div className="flex flex-col gap-4">
      <Notice tone="warn" title="Keep these recovery codes now." isAnnounced>
        They are not shown again. Each signs you in once without the authenticator.
      </Notice>
      <ul className="grid grid-cols-1 gap-x-6 gap-y-1 text-note sm:grid-cols-2">
        {codes.map((code) => (
          <li key={code}>
            <code className="whitespace-nowrap">{code}</code>
          </li>
        ))}
      </ul>
      <div>
        <Button onClick={onKept}>I have kept them</Button>
      </div>
    </div>
  );
}
