'use client';

import { useId, useRef, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useEditing } from '@/components/hooks/use-editing';
import { startMaps, updateSurvey, useCoolingTables } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Notice } from '@/components/ui/notice';
import type { SurveyView } from '@/lib/schemas/surveys';
import { mapSettingsWords } from './map-setting-words';
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
  const { survey, isOpen, onClose } = props;
  const [isBusy, setBusy] = useState(false);
  const formId = useId();
  const computes = survey.curves > 0;
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
      <MapSettingsForm {...props} formId={formId} onBusy={setBusy} />
    </Dialog>
  );
}

type FormProps = MapSettingsDialogProps & { formId: string; onBusy(isBusy: boolean): void };

function MapSettingsForm(props: FormProps) {
  const { collaboration, survey, proposedTable, formId, onBusy, onClose, onSaved } = props;
  const { data: tables } = useCoolingTables(collaboration);
  const editing = useEditing(survey.mapSettings);
  /** What the fields begin with; the newer ones once they were taken. */
  const [begun, setBegun] = useState({ settings: survey.mapSettings, isNewer: false });
  const [refusal, setRefusal] = useState<string | null>(null);
  const form = useRef<HTMLFormElement>(null);
  const save = async (held: FormData) => {
    onBusy(true);
    setRefusal(null);
    const mapSettings = { ...editing.opened(), ...readMapSettings(held) };
    try {
      await editing.attempt(mapSettings, async (opened) => {
        await updateSurvey(collaboration, survey.slug, { mapSettings: opened }, { mapSettings });
        if (survey.curves > 0) await startMaps(collaboration, survey.slug);
        onSaved();
        onClose();
      });
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    } finally {
      onBusy(false);
    }
  };
  if (!tables) return null;
  return (
    <form
      id={formId}
      ref={form}
      className="grid gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void save(new FormData(event.currentTarget));
      }}
    >
      <MapSettingsFields
        key={JSON.stringify(begun)}
        tables={tables}
        settings={begun.settings}
        proposedTableId={
          begun.isNewer ? undefined : tables.find((table) => table.name === proposedTable)?.id
        }
      />
      <ChangedNotice
        editing={editing}
        words={(settings) => mapSettingsWords(settings, tables)}
        onTake={(settings) => setBegun({ settings, isNewer: true })}
        onKeep={() => form.current && void save(new FormData(form.current))}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
    </form>
  );
}
