'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import {
  askForDeletion,
  askForExport,
  cancelDeletion,
  useLeaving,
} from '@/components/hooks/use-leaving';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { useMoment } from '@/components/ui/time-zone';
import type { LeavingView } from '@/lib/schemas/leaving';
import { LeavingDialog } from './leaving-dialog';
import { LeavingExports } from './leaving-exports';

/** Taking the whole collaboration along, and ending it. */
export function LeavingPart({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: LeavingView;
}) {
  const { data: view = initial, mutate } = useLeaving(collaboration, initial);
  const [busy, setBusy] = useState<string>();
  const [problem, setProblem] = useState<{ of: string; words: string }>();
  const [isAsking, setAsking] = useState(false);
  const moment = useMoment();
  const perform = async (name: string, task: () => Promise<LeavingView>) => {
    setBusy(name);
    setProblem(undefined);
    try {
      await mutate(await task(), { revalidate: false });
    } catch (reason) {
      setProblem({ of: name, words: sentenceOf(reason) });
    }
    setBusy(undefined);
    setAsking(false);
  };
  const isPacking = view.exports.some(({ status }) => status === 'waiting' || status === 'running');
  const refusal = (
    <div className="mb-3">
      <Notice tone="bad" title="It was not done." isAnnounced>
        {problem?.words}
      </Notice>
    </div>
  );
  return (
    <>
      <section className="min-w-0">
        <SectionOpener title="Take everything along" context="owners only; kept for 7 days" />
        <p className="mb-3 text-ink2">
          One archive with every table as JSON, every uploaded file as it came, and the files of
          each release. It holds no password and no token.
        </p>
        {problem?.of === 'export' && refusal}
        <Button
          icon="download"
          onClick={() => void perform('export', () => askForExport(collaboration))}
          isBusy={busy === 'export'}
          disabledReason={isPacking ? 'An archive is being made.' : undefined}
        >
          Make an archive
        </Button>
        <LeavingExports collaboration={collaboration} exports={view.exports} />
      </section>
      <section className="min-w-0">
        <SectionOpener title="Delete the collaboration" />
        {problem && problem.of !== 'export' && refusal}
        {view.deletion ? (
          <>
            <Notice tone="warn" title={`It will be deleted on ${moment(view.deletion.dueAt)}.`}>
              {view.deletion.askedBy} asked for it on {moment(view.deletion.askedAt, 'day')}. Until
              then nothing changes, and any owner can take it back.
            </Notice>
            <div className="mt-3">
              <Button
                icon="undo"
                onClick={() => void perform('cancel', () => cancelDeletion(collaboration))}
                isBusy={busy === 'cancel'}
              >
                Keep the collaboration
              </Button>
            </div>
          </>
        ) : (
          <>
            <p className="mb-3 text-ink2">
              Everything in it goes, after 7 days in which an owner can take it back. Members are
              told by mail.
            </p>
            <Button onClick={() => setAsking(true)}>Delete the collaboration</Button>
          </>
        )}
        <LeavingDialog
          view={view}
          isOpen={isAsking}
          isBusy={busy === 'delete'}
          onClose={() => setAsking(false)}
          onDelete={(name) => void perform('delete', () => askForDeletion(collaboration, name))}
        />
      </section>
    </>
  );
}
