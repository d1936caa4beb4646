'use client';

import { useId } from 'react';
import { useEditing } from '@/components/hooks/use-editing';
import { updateSurvey } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { announce } from '@/components/ui/toast-store';
import type { SurveyView } from '@/lib/schemas/surveys';
import { loadSurveyFacts, SurveyFields } from './survey-fields';

interface SurveyFactsDialogProps {
  collaboration: string;
  survey: SurveyView;
  isOpen: boolean;
  onClose(): void;
  onSaved(): void;
}

/** Name, band, years and description of a survey, changed; its maps stay as they are. */
export function SurveyFactsDialog({ isOpen, onClose, ...props }: SurveyFactsDialogProps) {
  const formId = useId();
  return (
    <Dialog
      isOpen={isOpen}
      onClose={onClose}
      title={`Change ${props.survey.name}`}
      actions={
        <>
          <Button type="submit" form={formId} variant="primary">
            Save
          </Button>
          <Button onClick={onClose}>Keep as it is</Button>
        </>
      }
    >
      <FactsForm formId={formId} onClose={onClose} {...props} />
    </Dialog>
  );
}

type Facts = Pick<SurveyView, 'name' | 'band' | 'description' | 'observedFrom' | 'observedTo'>;

const factsOf = ({ name, band, description, observedFrom, observedTo }: SurveyView): Facts => ({
  name,
  band,
  description,
  observedFrom,
  observedTo,
});

const factWords = (facts: Facts) => ({
  Name: facts.name,
  Band: facts.band,
  'First year': String(facts.observedFrom ?? ''),
  'Last year': String(facts.observedTo ?? ''),
  'What it searched for': facts.description,
});

function FactsForm({
  collaboration,
  survey,
  formId,
  onClose,
  onSaved,
}: Omit<SurveyFactsDialogProps, 'isOpen'> & { formId: string }) {
  const editing = useEditing(factsOf(survey));
  const { form, field, submit, refusal } = useSchemaForm(loadSurveyFacts, editing.opened());
  const save = submit((facts) =>
    editing.attempt({ ...editing.opened(), ...facts }, async (opened) => {
      await updateSurvey(collaboration, survey.slug, opened, facts);
      announce({ tone: 'ok', title: `${facts.name} is saved.` });
      onSaved();
      onClose();
    }),
  );
  return (
    <form id={formId} noValidate className="grid gap-4 md:grid-cols-2" onSubmit={save}>
      <SurveyFields field={field} />
      <div className="empty:hidden md:col-span-2">
        <ChangedNotice
          editing={editing}
          words={factWords}
          onTake={(now) => form.reset(now)}
          onKeep={() => void save()}
        />
      </div>
      {refusal !== null && (
        <div className="md:col-span-2">
          <Notice tone="bad" title={refusal} isAnnounced />
        </div>
      )}
    </form>
  );
}
