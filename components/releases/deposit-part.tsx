'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { sendDeposit, useDeposit } from '@/components/hooks/use-deposits';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { type StateKind, StateMark } from '@/components/ui/state-mark';
import { useDay } from '@/components/ui/time-zone';
import type { DepositView } from '@/lib/schemas/deposits';

const marks: Record<DepositView['state'], { kind: StateKind; words: string }> = {
  none: { kind: 'waiting', words: 'Not sent' },
  waiting: { kind: 'waiting', words: 'Waits to be sent' },
  running: { kind: 'running', words: 'Being sent' },
  failed: { kind: 'bad', words: 'Not deposited' },
  published: { kind: 'ok', words: 'Deposited' },
};

function stageWords({ stage, done, total }: DepositView): string {
  if (stage === 'draft') return 'A draft is being made there.';
  if (stage === 'doi') return 'An identifier is being reserved.';
  if (stage === 'upload') return `${done} of ${total} files have arrived.`;
  return stage === 'publish' ? 'It is being published there.' : 'It begins shortly.';
}

function Identifier({ view }: { view: DepositView }) {
  if (view.doi === null) return null;
  if (view.isPractice) {
    return <p>doi:{view.doi}, from a practice repository on this machine: it leads nowhere.</p>;
  }
  if (view.state !== 'published') {
    return <p>doi:{view.doi} is reserved and leads nowhere before it is published there.</p>;
  }
  return (
    <p>
      <a href={`https://doi.org/${view.doi}`}>doi:{view.doi}</a>
    </p>
  );
}

/** The copy of a published release in an open repository: its state, its DOI, and how to send it. */
export function DepositPart({
  collaboration,
  release,
  initial,
}: {
  collaboration: string;
  release: { id: string; key: string };
  initial: DepositView;
}) {
  const day = useDay();
  const { data: view = initial, mutate } = useDeposit(collaboration, release.id, initial);
  const [isAsking, setAsking] = useState(false);
  const { perform, isBusy, problem } = useAction();
  const send = async () => {
    await perform(async () =>
      mutate(await sendDeposit(collaboration, release.id), { revalidate: false }),
    );
    setAsking(false);
  };
  const { kind, words } = marks[view.state];
  const isUnderWay = view.state === 'waiting' || view.state === 'running';
  return (
    <section className="mt-8 min-w-0">
      <SectionOpener title="Open repository" context={view.repository ?? undefined} />
      {problem !== undefined && (
        <Notice tone="bad" title="It was not sent." isAnnounced>
          {problem}
        </Notice>
      )}
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <StateMark kind={kind}>{words}</StateMark>
        {view.canAsk && (
          <Button size="small" onClick={() => setAsking(true)}>
            {view.state === 'failed' ? 'Send it again' : 'Send it'}
          </Button>
        )}
      </div>
      <div
        className="mt-1 grid gap-1 pl-5 text-ink2 text-note [overflow-wrap:anywhere]"
        aria-live="polite"
      >
        {view.fault !== null && <p>{view.fault}.</p>}
        {isUnderWay && <p>{stageWords(view)}</p>}
        <Identifier view={view} />
        {view.publishedAt !== null && view.askedBy !== null && (
          <p>
            Sent by {view.askedBy}, {day(view.publishedAt)}
            {view.address !== null && (
              <>
                : <a href={view.address}>its page there</a>
              </>
            )}
          </p>
        )}
        {view.state === 'none' && view.whyNot !== null && <p>{view.whyNot}.</p>}
      </div>
      <Dialog
        isOpen={isAsking}
        onClose={() => setAsking(false)}
        title={`Send ${release.key} to ${view.repository ?? 'the repository'}?`}
        actions={
          <>
            <Button variant="primary" onClick={() => void send()} isBusy={isBusy}>
              Send it
            </Button>
            <Button onClick={() => setAsking(false)}>Not now</Button>
          </>
        }
      >
        <p>
          Title, authors, abstract and every file go there and become public under a DOI. What is
          deposited cannot be taken back from here, also when the release is withdrawn.
        </p>
      </Dialog>
    </section>
  );
}
