'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextField } from '@/components/ui/text-field';
import type { LeavingView } from '@/lib/schemas/leaving';

function pagesWords(count: number): string {
  if (count === 0) return 'It has published no release.';
  const pages = count === 1 ? 'The public page of its release' : `The ${count} public pages`;
  return `${pages} will say that the release was removed, with its title, its dates and the DOI of a copy elsewhere, and nothing more. A copy in an open repository stays there.`;
}

/** Asks for the name of the collaboration as it stands, so that nobody deletes another one. */
export function LeavingDialog({
  view,
  isOpen,
  isBusy,
  onClose,
  onDelete,
}: {
  view: LeavingView;
  isOpen: boolean;
  isBusy: boolean;
  onClose(): void;
  onDelete(name: string): void;
}) {
  const [typed, setTyped] = useState('');
  const isSame = typed.trim() === view.name;
  return (
    <Dialog
      isOpen={isOpen}
      onClose={onClose}
      title={`Delete ${view.name}?`}
      actions={
        <>
          <Button
            variant="primary"
            onClick={() => onDelete(typed)}
            isBusy={isBusy}
            disabledReason={isSame ? undefined : 'Type the name as it stands above.'}
          >
            Delete it in 7 days
          </Button>
          <Button onClick={onClose}>Keep it</Button>
        </>
      }
    >
      <div className="grid gap-3">
        <p>
          Surveys, maps, populations, analyses, runs, notes, files and the log go for good, for{' '}
          {view.members === 1 ? 'its one member' : `all ${view.members} members`}. Copies that other
          collaborations accepted stay with them. What stays here is that it was, when it went, and
          who asked.
        </p>
        <p>{pagesWords(view.publishedReleases)}</p>
        <TextField
          label={`Type "${view.name}"`}
          value={typed}
          onChange={(event) => setTyped(event.target.value)}
          autoComplete="off"
        />
      </div>
    </Dialog>
  );
}
