'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { createPopulation, savePopulationVersion } from '@/components/hooks/use-populations';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { LawDefinition } from './law-parts';

interface SavePopulationProps {
  collaboration: string;
  definition: LawDefinition;
  /** Why the population cannot be saved, or null. */
  fault: string | null;
  /** The version that it goes out from. */
  version?: ListedPopulation;
  isChanged: boolean;
  canShare: boolean;
}

/** Saving asks for a name or a note, and says in a sentence why it was refused. */
export function SavePopulation(props: SavePopulationProps) {
  const { collaboration, definition, fault, version, isChanged, canShare } = props;
  const router = useRouter();
  const addsVersion = version?.can.saveVersion === true;
  const [isOpen, setOpen] = useState(false);
  const [name, setName] = useState(version ? `${version.name}, own` : '');
  const [note, setNote] = useState('');
  const [isShared, setShared] = useState(version?.isShared ?? canShare);
  const { perform, isBusy, problem } = useAction();

  const save = () =>
    perform(async () => {
      const saved =
        addsVersion && version
          ? await savePopulationVersion(collaboration, version.key, { note, definition })
          : await createPopulation(collaboration, {
              name: name.trim(),
              note,
              convention: 'log',
              definition,
              isShared: isShared && canShare,
            });
      setOpen(false);
      router.push(`/${collaboration}/populations/${saved.key}`);
      router.refresh();
    });
  const words = !version
    ? 'Save the population'
    : addsVersion
      ? `Save as version ${version.version + 1}`
      : 'Save as a population of my own';

  return (
    <>
      <Button
        variant="primary"
        onClick={() => setOpen(true)}
        disabledReason={
          fault !== null
            ? `It cannot be used: ${fault}.`
            : version && !isChanged
              ? `Nothing differs from version ${version.version}.`
              : undefined
        }
      >
        {words}
      </Button>
      <Dialog
        isOpen={isOpen}
        onClose={() => setOpen(false)}
        title={words}
        actions={
          <>
            <Button
              variant="primary"
              onClick={save}
              isBusy={isBusy}
              disabledReason={!addsVersion && name.trim() === '' ? 'Give it a name.' : undefined}
            >
              Save
            </Button>
            <Button onClick={() => setOpen(false)}>Not yet</Button>
          </>
        }
      >
        <div className="grid gap-4">
          <p className="text-ink2 text-note">
            {addsVersion
              ? 'Versions are never changed: analyses that use an earlier one keep it.'
              : version
                ? 'Only whoever began this population, a statistician or an owner adds versions to it. This saves a population of your own, from which you can work on.'
                : 'A population is a shape; how many planets there are is what an analysis asks.'}
          </p>
          {!addsVersion && (
            <TextField
              label="Name"
              value={name}
              maxLength={100}
              onChange={(event) => setName(event.target.value)}
            />
          )}
          <TextAreaField
            label="Note"
            hint="Where the numbers come from."
            value={note}
            maxLength={2000}
            rows={3}
            onChange={(event) => setNote(event.target.value)}
          />
          {!addsVersion && canShare && (
            <CheckboxField
              label="Share with all"
              hint="A shared population can be used as the collaboration's own."
              checked={isShared}
              onChange={(event) => setShared(event.target.checked)}
            />
          )}
          {problem !== undefined && (
            <Notice tone="bad" title="It was not saved." isAnnounced>
              {problem}
            </Notice>
          )}
        </div>
      </Dialog>
    </>
  );
}
