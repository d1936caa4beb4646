import type { ReactNode } from 'react';
import type { ReleaseStep } from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { type StateKind, StateMark } from '@/components/ui/state-mark';
import type { ReleaseView } from '@/lib/schemas/releases';
import { longDay } from './release-words';

interface StepsProps {
  release: ReleaseView;
  busy: string | undefined;
  onStep(step: ReleaseStep): void;
}

function Step({
  kind,
  title,
  children,
  action,
}: {
  kind: StateKind;
  title: string;
  children?: ReactNode;
  action?: ReactNode;
}) {
  return (
    <li className="border-rule border-b py-3">
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <StateMark kind={kind}>{title}</StateMark>
        {action}
      </div>
      {children !== undefined && <div className="mt-1 pl-5 text-ink2 text-note">{children}</div>}
    </li>
  );
}

function CheckStep({ release, busy, onStep }: StepsProps) {
  const { state, verification, job, can } = release;
  const again = can.change && (state === 'mismatch' || state === 'failed') && (
    <Button size="small" onClick={() => onStep('check')} isBusy={busy === 'check'}>
      Run again
    </Button>
  );
  if (verification?.isSame) {
    const toTheBit = verification.runs.every(({ isSameDigest }) => isSameDigest);
    return (
      <Step kind="ok" title="Run again from its inputs">
        {longDay(verification.checkedAt)}: every number is the same to {verification.digits} digits
        {toTheBit && ', and to the last bit'}.
      </Step>
    );
  }
  if (verification) {
    return (
      <Step kind="bad" title="Run again from its inputs: other numbers" action={again}>
        The release stops here. What differs:
        <ul className="mt-1 list-disc pl-5">
          {verification.runs.flatMap((run) =>
            run.differences.map((line) => (
              <li key={`${run.runId}-${line}`} className="break-all">
                {run.name}, {line}
              </li>
            )),
          )}
        </ul>
      </Step>
    );
  }
  if (state === 'failed') {
    return (
      <Step kind="bad" title="The check failed" action={again}>
        {job?.fault}
      </Step>
    );
  }
  return (
    <Step
      kind={state === 'checking' ? 'running' : 'waiting'}
      title={state === 'checking' ? 'Being run again from its inputs' : 'Run again from its inputs'}
    >
      {state === 'checking'
        ? 'Every map and every posterior is computed anew and compared to six digits.'
        : 'Starts by itself once both have signed.'}
    </Step>
  );
}

/** The four steps of a release, each with who took it or who may. */
export function ReleaseSteps(props: StepsProps) {
  const { release, busy, onStep } = props;
  const { signedOff, agreed, published, can, state } = release;
  return (
    <ol>
      <Step
        kind={signedOff ? 'ok' : 'waiting'}
        title="A statistician signs it off"
        action={
          can.signOff && (
            <Button
              size="small"
              variant="primary"
              onClick={() => onStep('sign-off')}
              isBusy={busy === 'sign-off'}
            >
              Sign off
            </Button>
          )
        }
      >
        {signedOff ? `${signedOff.by}, ${longDay(signedOff.at)}` : can.whyNotSignOff}
      </Step>
      <Step
        kind={agreed ? 'ok' : 'waiting'}
        title="An author or an owner agrees"
        action={
          can.agree && (
            <Button
              size="small"
              variant="primary"
              onClick={() => onStep('agree')}
              isBusy={busy === 'agree'}
            >
              Agree
            </Button>
          )
        }
      >
        {agreed ? `${agreed.by}, ${longDay(agreed.at)}` : can.whyNotAgree}
      </Step>
      <CheckStep {...props} />
      <Step
        kind={published ? 'released' : 'waiting'}
        title="Published"
        action={
          can.publish && (
            <Button
              size="small"
              variant="primary"
              onClick={() => onStep('publish')}
              isBusy={busy === 'publish'}
            >
              Publish
            </Button>
          )
        }
      >
        {published
          ? `${published.by}, ${longDay(published.at)}`
          : state === 'checked'
            ? 'Anybody will be able to read it, and it will not change.'
            : undefined}
      </Step>
    </ol>
  );
}
