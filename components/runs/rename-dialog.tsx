'use client';

import { useId } from 'react';
import { renameAnalysis } from '@/components/hooks/use-analyses';
import { useEditing } from '@/components/hooks/use-editing';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import type { AnalysisView } from '@/lib/schemas/analyses';

const loadName = async () => (await import('@/lib/schemas/analyses')).renameAnalysisSchema;

interface RenameDialogProps {
  collaboration: string;
  analysis: AnalysisView;
  onClose(): void;
  onSaved(): void;
}

/** A name of its own for what a copy was made for. */
export function RenameDialog({ collaboration, analysis, onClose, onSaved }: RenameDialogProps) {
  const formId = useId();
  const editing = useEditing({ name: analysis.name });
  const { form, field, submit, refusal } = useSchemaForm(loadName, editing.opened());
  const save = submit((mine) =>
    editing.attempt(mine, async (opened) => {
      await renameAnalysis(collaboration, analysis.key, opened, mine);
      onSaved();
      onClose();
    }),
  );
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={`Rename ${analysis.key}`}
      actions={
        <>
          <Button type="submit" form={formId} variant="primary">
            Save
          </Button>
          <Button onClick={onClose}>Keep as it is</Button>
        </>
      }
    >
      <form id={formId} noValidate className="grid gap-4" onSubmit={save}>
        <TextField label="Name" required {...field('name')} />
        <ChangedNotice
          editing={editing}
          words={({ name }) => ({ Name: name })}
          onTake={(now) => form.reset(now)}
          onKeep={() => void save()}
        />
        {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      </form>
    </Dialog>
  );
}
