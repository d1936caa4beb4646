'use client';

import { useId } from 'react';
import { updateSurvey } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
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

function FactsForm({
  collaboration,
  survey,
  formId,
  onClose,
  onSaved,
}: Omit<SurveyFactsDialogProps, 'isOpen'> & { formId: string }) {
  const { name, band, description, observedFrom, observedTo } = survey;
  const { field, submit, refusal } = useSchemaForm(loadSurveyFacts, {
    name,
    band,
    description,
    observedFrom,
    observedTo,
  });
  return (
    <form
      id={formId}
      noValidate
      className="grid gap-4 md:grid-cols-2"
      onSubmit={submit(async (facts) => {
        await updateSurvey(collaboration, survey.slug, facts);
        announce({ tone: 'ok', title: `${facts.name} is saved.` });
        onSaved();
        onClose();
      })}
    >
      <SurveyFields field={field} />
      {refusal !== null && (
        <div className="md:col-span-2">
          <Notice tone="bad" title={refusal} isAnnounced />
        </div>
      )}
    </form>
  );
}
