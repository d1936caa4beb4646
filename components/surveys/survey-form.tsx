'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { createSurvey, useCoolingTables } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import { MapSettingsFields, readMapSettings } from './map-settings-fields';

const yearOf = (value: FormDataEntryValue | null) => (value ? Number(value) : null);

/** Name, band and the settings with which curves become maps. */
export function SurveyForm({ collaboration }: { collaboration: string }) {
  const router = useRouter();
  const { data: tables = [] } = useCoolingTables(collaboration);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(false);
  const submit = async (form: FormData) => {
    setBusy(true);
    setRefusal(null);
    try {
      const survey = await createSurvey(collaboration, {
        name: String(form.get('name')),
        band: String(form.get('band')),
        description: String(form.get('description')),
        observedFrom: yearOf(form.get('observedFrom')),
        observedTo: yearOf(form.get('observedTo')),
        mapSettings: readMapSettings(form),
      });
      router.push(`/${collaboration}/surveys/${survey.slug}/import`);
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      setBusy(false);
    }
  };
  return (
    <form
      className="grid content-start gap-4 md:grid-cols-2"
      onSubmit={(event) => {
        event.preventDefault();
        void submit(new FormData(event.currentTarget));
      }}
    >
      <div className="md:col-span-2">
        <SectionOpener number={1} title="The survey" context="its name is how everybody cites it" />
      </div>
      <TextField label="Name" name="name" required maxLength={60} />
      <TextField
        label="Band of the contrast curves"
        name="band"
        hint="As in the magnitude columns: H, K, L"
        required
        maxLength={12}
      />
      <NumberField label="First year" name="observedFrom" step={1} min={1950} max={2100} />
      <NumberField label="Last year" name="observedTo" step={1} min={1950} max={2100} />
      <div className="md:col-span-2">
        <TextAreaField label="What it searched for" name="description" maxLength={2000} />
      </div>
      <div className="mt-4 md:col-span-2">
        <SectionOpener
          number={2}
          title="From curves to maps"
          context="can be changed later; the maps are then computed anew"
        />
      </div>
      <MapSettingsFields tables={tables} />
      <div className="flex flex-col gap-3 md:col-span-2">
        {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
        <div>
          <Button type="submit" variant="primary" isBusy={isBusy}>
            Add the survey and import files
          </Button>
        </div>
      </div>
    </form>
  );
}
