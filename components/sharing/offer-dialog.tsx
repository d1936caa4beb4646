'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { offerSurvey } from '@/components/hooks/use-sharing';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import type { ShareScope } from '@/lib/schemas/sharing';

const goesAlong: Record<ShareScope, string> = {
  whole:
    'Targets with their adopted ages and distances, curves, maps, the cooling table, companions and their epochs go along. Files, notes and analyses stay here.',
  maps: 'Maps go along with the names, places and distances of their stars, host masses, and companions with mass and semi-major axis. Curves, files, ages, magnitudes and epochs stay here.',
};

interface OfferDialogProps {
  collaboration: string;
  survey: { slug: string; name: string };
  onClose(): void;
  onOffered(): void;
}

/** To whom, how much of it, and on which terms. */
export function OfferDialog({ collaboration, survey, onClose, onOffered }: OfferDialogProps) {
  const [code, setCode] = useState('');
  const [scope, setScope] = useState<ShareScope>('whole');
  const [attribution, setAttribution] = useState('');
  const [note, setNote] = useState('');
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const missing =
    code.trim() === ''
      ? 'Enter the sharing code of the other collaboration'
      : attribution.trim() === ''
        ? 'State how results that use it name its source'
        : undefined;
  const offer = () =>
    perform(async () => {
      await offerSurvey(collaboration, survey.slug, { code, scope, attribution, note });
      onOffered();
      onClose();
    });
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={`Offer ${survey.name}`}
      actions={
        <>
          <Button
            variant="primary"
            isBusy={isBusy}
            disabledReason={missing}
            onClick={() => void offer()}
          >
            Offer it
          </Button>
          <Button onClick={onClose}>Cancel</Button>
        </>
      }
    >
      <div className="grid gap-3">
        <TextField
          label="Sharing code"
          hint="of the collaboration that is to receive it: its people find it under Surveys, Sharing"
          placeholder="0000-0000-0000"
          autoComplete="off"
          value={code}
          onChange={(event) => setCode(event.target.value)}
        />
        <SelectField
          label="What is offered"
          hint={goesAlong[scope]}
          value={scope}
          options={[
            { value: 'whole', label: 'The whole survey' },
            { value: 'maps', label: 'Its maps only' },
          ]}
          onChange={(event) => setScope(event.target.value === 'maps' ? 'maps' : 'whole')}
        />
        <TextField
          label="Attribution"
          hint="stands on their survey page and with every result that uses it"
          maxLength={500}
          value={attribution}
          onChange={(event) => setAttribution(event.target.value)}
        />
        <TextAreaField
          label="Note to them (optional)"
          maxLength={1000}
          value={note}
          onChange={(event) => setNote(event.target.value)}
        />
        {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      </div>
    </Dialog>
  );
}
