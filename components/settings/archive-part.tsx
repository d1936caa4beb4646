'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { SettingsPartProps } from './place-form';

/** Read only from now on, or open again. */
export function ArchivePart({ settings, save }: SettingsPartProps) {
  const [isAsking, setAsking] = useState(false);
  if (settings.archivedAt !== null) {
    return (
      <>
        <p className="mb-3 text-ink2">
          Members can change things again, each as their role allows.
        </p>
        <Button
          icon="undo"
          onClick={() => void save({ isArchived: false }, 'The collaboration is open again.')}
        >
          Open it again
        </Button>
      </>
    );
  }
  return (
    <>
      <p className="mb-3 text-ink2">
        An archived collaboration can be read and exported, and nothing in it changes. An owner can
        open it again.
      </p>
      <Button icon="lock" onClick={() => setAsking(true)}>
        Archive the collaboration
      </Button>
      <Dialog
        isOpen={isAsking}
        onClose={() => setAsking(false)}
        title={`Archive ${settings.name}?`}
        actions={
          <>
            <Button
              variant="primary"
              onClick={() => {
                setAsking(false);
                void save({ isArchived: true }, 'The collaboration is archived.');
              }}
            >
              Archive
            </Button>
            <Button onClick={() => setAsking(false)}>Keep it open</Button>
          </>
        }
      >
        <p>
          Nobody imports, runs, vets, writes notes or invites until an owner opens it again. What is
          running ends by itself.
        </p>
      </Dialog>
    </>
  );
}
