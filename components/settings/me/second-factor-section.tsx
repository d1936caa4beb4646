'use client';

import { useState } from 'react';
import {
  beginFactor,
  confirmFactor,
  removeFactor,
  renewRecoveryCodes,
} from '@/components/hooks/use-second-factor';
import { Button } from '@/components/ui/button';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import type { NewKey, SecondFactorView } from '@/lib/schemas/account-access';
import { CodeField, FactorForm, OwnPasswordField, RecoveryCodes } from './factor-parts';

type Step =
  | { at: 'rest' | 'password' | 'renew' | 'remove' }
  | { at: 'key'; given: NewKey }
  | { at: 'codes'; codes: string[] };

/** The key as people copy it by hand: in groups of four. */
const grouped = (key: string) => key.replace(/(.{4})(?=.)/g, '$1 ');

/** A code besides the password: set up, recovery codes, and turned off again. */
export function SecondFactorSection({ initial }: { initial: SecondFactorView }) {
  const [factor, setFactor] = useState(initial);
  const [step, setStep] = useState<Step>({ at: 'rest' });
  const rest = () => setStep({ at: 'rest' });
  const showCodes = (codes: string[]) => {
    setFactor({ isOn: true, codesLeft: codes.length });
    setStep({ at: 'codes', codes });
  };
  return (
    <section className="min-w-0">
      <SectionOpener
        title="Second factor"
        context={factor.isOn ? 'a code is asked for when you sign in' : 'off'}
      />
      <div className="flex max-w-[440px] flex-col gap-4">
        {step.at === 'rest' && !factor.isOn && (
          <>
            <p className="text-ink3 text-note">
              An authenticator on your phone shows a code that changes every 30 seconds. With it, a
              password of 8 characters is enough.
            </p>
            <div>
              <Button onClick={() => setStep({ at: 'password' })}>Set it up</Button>
            </div>
          </>
        )}
        {step.at === 'rest' && factor.isOn && (
          <>
            <p className="text-note">
              {factor.codesLeft === 1
                ? '1 recovery code is left.'
                : `${factor.codesLeft} recovery codes are left.`}
            </p>
            <p className="flex flex-wrap gap-x-5 text-note">
              <TextAction onClick={() => setStep({ at: 'renew' })}>New recovery codes</TextAction>
              <TextAction onClick={() => setStep({ at: 'remove' })}>Turn it off</TextAction>
            </p>
          </>
        )}
        {step.at === 'password' && (
          <FactorForm
            key="password"
            button="Show the key"
            onSend={async ({ password }) =>
              setStep({ at: 'key', given: await beginFactor(password) })
            }
          >
            <OwnPasswordField />
          </FactorForm>
        )}
        {step.at === 'key' && (
          <FactorForm
            key="key"
            button="Turn it on"
            onSend={async ({ code }) => showCodes((await confirmFactor(code)).recoveryCodes)}
          >
            <div className="text-note">
              <p className="text-ink2">Type this key into your authenticator</p>
              <p>
                <code className="[overflow-wrap:anywhere]">{grouped(step.given.key)}</code>
              </p>
              <p className="mt-2">
                <a className="text-act underline underline-offset-3" href={step.given.address}>
                  Or open it on this device
                </a>
              </p>
              <p className="mt-1 text-ink3 [overflow-wrap:anywhere]">{step.given.address}</p>
            </div>
            <CodeField hint="The six digits that it shows; your other sessions end" />
          </FactorForm>
        )}
        {step.at === 'renew' && (
          <FactorForm
            key="renew"
            button="Make new ones"
            onSend={async ({ code }) => showCodes((await renewRecoveryCodes(code)).recoveryCodes)}
          >
            <CodeField />
          </FactorForm>
        )}
        {step.at === 'remove' && (
          <FactorForm
            key="remove"
            button="Turn it off"
            onSend={async ({ password, code }) => {
              await removeFactor(password, code);
              setFactor({ isOn: false, codesLeft: 0 });
              rest();
            }}
          >
            <OwnPasswordField />
            <CodeField />
          </FactorForm>
        )}
        {step.at === 'codes' && <RecoveryCodes codes={step.codes} onKept={rest} />}
        {step.at !== 'rest' && step.at !== 'codes' && (
          <p className="text-note">
            <TextAction onClick={rest}>Cancel</TextAction>
          </p>
        )}
      </div>
    </section>
  );
}
