'use client';

import { useState } from 'react';
import { type Action, useAction } from '@/components/hooks/use-action';
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
  const packing = useAction();
  const deletion = useAction();
  const keeping = useAction();
  const [isAsking, setAsking] = useState(false);
  const moment = useMoment();
  const perform = async (action: Action, task: () => Promise<LeavingView>) => {
    for (const one of [packing, deletion, keeping]) one.clear();
    await action.perform(async () => mutate(await task(), { revalidate: false }));
    setAsking(false);
  };
  const isPacking = view.exports.some(({ status }) => status === 'waiting' || status === 'running');
  const refusal = (problem: string | undefined) =>
    problem !== undefined && (
      <div className="mb-3">
        <Notice tone="bad" title="It was not done." isAnnounced>
          {problem}
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
        {refusal(packing.problem)}
        <Button
          icon="download"
          onClick={() => void perform(packing, () => askForExport(collaboration))}
          isBusy={packing.isBusy}
          disabledReason={isPacking ? 'An archive is being made.' : undefined}
        >
          Make an archive
        </Button>
        <LeavingExports collaboration={collaboration} exports={view.exports} />
      </section>
      <section className="min-w-0">
        <SectionOpener title="Delete the collaboration" />
        {refusal(deletion.problem ?? keeping.problem)}
        {view.deletion ? (
          <>
            <Notice tone="warn" title={`It will be deleted on ${moment(view.deletion.dueAt)}.`}>
              {view.deletion.askedBy} asked for it on {moment(view.deletion.askedAt, 'day')}. Until
              then nothing changes, and any owner can take it back.
            </Notice>
            <div className="mt-3">
              <Button
                icon="undo"
                onClick={() => void perform(keeping, () => cancelDeletion(collaboration))}
                isBusy={keeping.isBusy}
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
          isBusy={deletion.isBusy}
          onClose={() => setAsking(false)}
          onDelete={(name) => void perform(deletion, () => askForDeletion(collaboration, name))}
        />
      </section>
    </>
  );
}
