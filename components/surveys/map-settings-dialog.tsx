'use client';

import { useId, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { startMaps, updateSurvey, useCoolingTables } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import type { SurveyView } from '@/lib/schemas/surveys';
import { MapSettingsFields, readMapSettings } from './map-settings-fields';

interface MapSettingsDialogProps {
  collaboration: string;
  survey: SurveyView;
  isOpen: boolean;
  /** Name of a cooling table that is proposed in place of the present one. */
  proposedTable?: string;
  onClose(): void;
  onSaved(): void;
}

/** Changes how a survey's curves become maps, and computes the maps anew where there are curves. */
export function MapSettingsDialog(props: MapSettingsDialogProps) {
  const { collaboration, survey, isOpen, proposedTable, onClose, onSaved } = props;
  const { data: tables } = useCoolingTables(collaboration);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const formId = useId();
  const computes = survey.curves > 0;
  const save = async (form: FormData) => {
    setBusy(true);
    setRefusal(null);
    try {
      await updateSurvey(collaboration, survey.slug, {
        mapSettings: { ...survey.mapSettings, ...readMapSettings(form) },
      });
      if (computes) await startMaps(collaboration, survey.slug);
      onSaved();
      onClose();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    } finally {
      setBusy(false);
    }
  };
  return (
    <Dialog
      isOpen={isOpen}
      onClose={onClose}
      title={`Maps of ${survey.name}`}
      actions={
        <>
          <Button type="submit" form={formId} variant="primary" isBusy={isBusy}>
            {computes ? 'Save and compute the maps' : 'Save'}
          </Button>
          <Button onClick={onClose}>Keep as it is</Button>
        </>
      }
    >
      <p className="mb-4 text-ink2">
        {computes
          ? 'Other settings make other maps. Runs that are there keep the maps that they used.'
          : 'The curves of this survey become maps with these settings.'}
      </p>
      {tables && (
        <form
          id={formId}
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            void save(new FormData(event.currentTarget));
          }}
        >
          <MapSettingsFields
            tables={tables}
            settings={survey.mapSettings}
            proposedTableId={tables.find((table) => table.name === proposedTable)?.id}
          />
        </form>
      )}
      {refusal !== null && (
        <div className="mt-4">
          <Notice tone="bad" title={refusal} isAnnounced />
        </div>
      )}
    </Dialog>
  );
}
