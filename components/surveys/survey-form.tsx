'use client';

import { useRouter } from 'next/navigation';
import { useRef } from 'react';
import { createSurvey, useCoolingTables } from '@/components/hooks/use-surveys';
import { Button } from '@/components/ui/button';
import { LeaveGuard } from '@/components/ui/form/leave-guard';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { MapSettingsFields, readMapSettings } from './map-settings-fields';
import { loadSurveyFacts, SurveyFields } from './survey-fields';

/** Name, band and the settings with which curves become maps. */
export function SurveyForm({ collaboration }: { collaboration: string }) {
  const router = useRouter();
  const { data: tables = [] } = useCoolingTables(collaboration);
  const settings = useRef<HTMLFormElement>(null);
  const { field, submit, refusal, isBusy, isUnsaved } = useSchemaForm(loadSurveyFacts, {
    name: '',
    band: '',
    description: '',
    observedFrom: null,
    observedTo: null,
  });
  return (
    <form
      ref={settings}
      noValidate
      className="grid content-start gap-4 md:grid-cols-2"
      onSubmit={submit(async (facts) => {
        const mapSettings = readMapSettings(new FormData(settings.current ?? undefined));
        const survey = await createSurvey(collaboration, { ...facts, mapSettings });
        router.push(`/${collaboration}/surveys/${survey.slug}/import`);
      })}
    >
      <LeaveGuard isUnsaved={isUnsaved} />
      <div className="md:col-span-2">
        <SectionOpener number={1} title="The survey" context="its name is how everybody cites it" />
      </div>
      <SurveyFields field={field} />
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
