import { type ReactNode, useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

interface Versioned {
  key: string;
  number: number;
  version: number;
  name: string;
}

export interface VersionSave<View> {
  /** The saved one that is shown, unless a new one is being made. */
  open: View | undefined;
  name: string;
  rename(name: string): void;
  show(view: View | undefined): void;
  /** Goes on with what was made of it, and its name, as with a new one. */
  close(): void;
  save(versionOf: number | undefined): Promise<void>;
  busy: 'new' | 'version' | undefined;
  problem: string | undefined;
}

/**
 * Which of several versioned things is open, and saving what was made of it: as its next version or
 * as a new one.
 *
 * @param store saves it and reads the list anew
 */
export function useVersionSave<View extends Versioned>(
  store: (given: { name: string; versionOf: number | undefined }) => Promise<View>,
): VersionSave<View> {
  const [open, setOpen] = useState<View>();
  const [name, rename] = useState('');
  const { perform, isBusy, problem, clear } = useAction();
  const [pressed, setPressed] = useState<'new' | 'version'>();
  return {
    open,
    name,
    rename,
    busy: isBusy ? pressed : undefined,
    problem,
    show(view) {
      setOpen(view);
      rename(view?.name ?? '');
      clear();
    },
    close: () => setOpen(undefined),
    async save(versionOf) {
      setPressed(versionOf === undefined ? 'new' : 'version');
      await perform(async () => setOpen(await store({ name, versionOf })));
    },
  };
}

interface SaveVersionProps<View> {
  saving: VersionSave<View>;
  /** "sample", as in "Save as a new sample". */
  noun: string;
  canSaveVersion: boolean;
  /** Why it cannot be saved. */
  fault: string | undefined;
  /** A further way on, beside the buttons. */
  children?: ReactNode;
}

/** Its name and the buttons that save it. */
export function SaveVersion<View extends Versioned>({
  saving: { open, name, rename, save, busy, problem },
  noun,
  canSaveVersion,
  fault,
  children,
}: SaveVersionProps<View>) {
  const hasVersions = open !== undefined && canSaveVersion;
  return (
    <>
      <TextField
        label="Name"
        value={name}
        maxLength={100}
        onChange={(event) => rename(event.target.value)}
      />
      {problem !== undefined && (
        <Notice tone="bad" title="It was not saved." isAnnounced>
          {problem}
        </Notice>
      )}
      <div className="flex flex-wrap gap-2">
        {hasVersions && (
          <Button
            variant="primary"
            disabledReason={fault}
            isBusy={busy === 'version'}
            onClick={() => save(open.number)}
          >
            Save version {open.version + 1} of {open.key}
          </Button>
        )}
        <Button
          variant={hasVersions ? 'normal' : 'primary'}
          disabledReason={fault}
          isBusy={busy === 'new'}
          onClick={() => save(undefined)}
        >
          Save as a new {noun}
        </Button>
        {children}
      </div>
    </>
  );
}
