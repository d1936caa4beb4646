'use client';

import { useEffect, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { readDependents, withdrawUpload } from '@/components/hooks/use-uploads';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import type { UploadDependents, UploadView } from '@/lib/schemas/uploads';

interface WithdrawDialogProps {
  collaboration: string;
  /** The file in question; null while none is. */
  upload: UploadView | null;
  onClose(): void;
  onWithdrawn(): void;
}

/** Shows what a stored file carries before it is taken back. */
export function WithdrawDialog({
  collaboration,
  upload,
  onClose,
  onWithdrawn,
}: WithdrawDialogProps) {
  const [found, setFound] = useState<UploadDependents | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const id = upload?.id;

  useEffect(() => {
    if (id === undefined) return;
    let isShown = true;
    readDependents(collaboration, id).then(
      (answer) => isShown && setFound(answer),
      (reason: unknown) => isShown && setRefusal(sentenceOf(reason)),
    );
    return () => {
      isShown = false;
    };
  }, [collaboration, id]);

  const withdraw = async () => {
    if (id === undefined) return;
    setBusy(true);
    try {
      await withdrawUpload(collaboration, id);
      onWithdrawn();
      onClose();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    } finally {
      setBusy(false);
    }
  };
  return (
    <Dialog
      isOpen={upload !== null}
      onClose={onClose}
      title={`Withdraw ${upload?.fileName ?? ''}`}
      actions={
        <>
          <Button
            variant="primary"
            isBusy={isBusy}
            disabledReason={found === null ? 'What rests on the file is not known yet' : undefined}
            onClick={() => void withdraw()}
          >
            Withdraw this file
          </Button>
          <Button onClick={onClose}>Keep it</Button>
        </>
      }
    >
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {found === null && refusal === null && (
        <p className="text-ink3">Looking at what rests on it</p>
      )}
      {found && <Dependents collaboration={collaboration} found={found} />}
    </Dialog>
  );
}

function Names({ words, names }: { words: string; names: UploadDependents['goBack'] }) {
  if (names.count === 0) return null;
  const more = names.count - names.names.length;
  return (
    <li className="border-rule border-b py-1.5">
      <b>{names.count}</b> {words}
      <span className="block break-words text-ink3 text-note">
        {names.names.join(', ')}
        {more > 0 && ` and ${more} more`}
      </span>
    </li>
  );
}

function Dependents({ collaboration, found }: { collaboration: string; found: UploadDependents }) {
  const { targetsLeftOut, goBack, end, stay, runs } = found;
  return (
    <div className="grid gap-3">
      <ul>
        <Names words="targets are left out, reason “upload withdrawn”" names={targetsLeftOut} />
        <Names words="go back to what stood before this file" names={goBack} />
        <Names words="end: nothing stood there before" names={end} />
        <Names words="stay as they are" names={stay} />
      </ul>
      {[targetsLeftOut, goBack, end, stay].every(({ count }) => count === 0) && (
        <p className="text-ink2">Nothing rests on it any more.</p>
      )}
      {runs.length === 0 ? (
        <p className="text-ink2">No finished run has used it.</p>
      ) : (
        <div>
          <p className="text-ink2">
            {runs.length === 1 ? '1 run has' : `${runs.length} runs have`} used its stars. Runs stay
            as they are, marked as made with older inputs:
          </p>
          <ul className="mt-1 max-h-40 overflow-y-auto text-note">
            {runs.map(({ analysis, name, run }) => (
              <li key={`${analysis}-${run}`}>
                <Link href={`/${collaboration}/analyses/A-${analysis}`}>A-{analysis}</Link>, run{' '}
                {run}: {name}
              </li>
            ))}
          </ul>
        </div>
      )}
      <p className="text-ink3 text-note">
        The original bytes stay in the list. To bring the file back, upload it again.
      </p>
    </div>
  );
}
