import type { ReactNode } from 'react';
import type { ReleaseStep } from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { type StateKind, StateMark } from '@/components/ui/state-mark';
import { useDay } from '@/components/ui/time-zone';
import type { ReleaseView } from '@/lib/schemas/releases';

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
  const day = useDay();
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
        {day(verification.checkedAt)}: every number is the same to {verification.digits} digits
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
        {verification.runs.map(
          ({ runId, name, cause }) =>
            cause && (
              <p key={runId} className="mt-1">
                {name}: {cause}.
              </p>
            ),
        )}
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

/** A step that one person takes: by whom and when, else why not yet. */
function TakenStep({
  step,
  title,
  word,
  taken,
  mayTake,
  whyNot,
  kind = 'ok',
  ...props
}: StepsProps & {
  step: ReleaseStep;
  title: string;
  word: string;
  taken: { by: string; at: string } | null;
  mayTake: boolean;
  whyNot: string | null | undefined;
  kind?: StateKind;
}) {
  const day = useDay();
  return (
    <Step
      kind={taken ? kind : 'waiting'}
      title={title}
      action={
        mayTake && (
          <Button
            size="small"
            variant="primary"
            onClick={() => props.onStep(step)}
            isBusy={props.busy === step}
          >
            {word}
          </Button>
        )
      }
    >
      {taken ? `${taken.by}, ${day(taken.at)}` : whyNot}
    </Step>
  );
}

/** The four steps of a release, each with who took it or who may. */
export function ReleaseSteps(props: StepsProps) {
  const { signedOff, agreed, published, can, state } = props.release;
  return (
    <ol>
      <TakenStep
        {...props}
        step="sign-off"
        title="A statistician signs it off"
        word="Sign off"
        taken={signedOff}
        mayTake={can.signOff}
        whyNot={can.whyNotSignOff}
      />
      <TakenStep
        {...props}
        step="agree"
        title="An author or an owner agrees"
        word="Agree"
        taken={agreed}
        mayTake={can.agree}
        whyNot={can.whyNotAgree}
      />
      <CheckStep {...props} />
      <TakenStep
        {...props}
        step="publish"
        title="Published"
        word="Publish"
        taken={published}
        mayTake={can.publish}
        whyNot={
          state === 'checked'
            ? 'Anybody will be able to read it, and it will not change.'
            : undefined
        }
        kind="released"
      />
    </ol>
  );
}
