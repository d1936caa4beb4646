'use client';

import { useDeferredValue, useState } from 'react';
import { ExportButton } from '@/components/exports/export-button';
import { sentenceOf } from '@/components/hooks/api-problem';
import { createSample, useSamplePreview, useSamples } from '@/components/hooks/use-samples';
import { CHECKS_COME, useSchema } from '@/components/hooks/use-schema';
import { StarTabs } from '@/components/stars/star-tabs';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import type { SamplePreview, SampleView } from '@/lib/schemas/samples';
import type { StarList } from '@/lib/schemas/stars';
import type { SurveyView } from '@/lib/schemas/surveys';
import { SampleCounts } from './sample-counts';
import { draftOf, EMPTY_DRAFT, readDraft, type SampleDraft } from './sample-draft';
import { SampleForm } from './sample-form';
import { SampleTable } from './sample-table';
import { SaveVersion, useVersionSave } from './save-version';

const loadSchema = async () => (await import('@/lib/schemas/samples')).sampleDefinitionSchema;

interface SamplesScreenProps {
  collaboration: string;
  surveys: SurveyView[];
  initial: SampleView[];
  /** Of the whole collaboration. */
  counts: Pick<StarList['counts'], 'stars' | 'undecided'>;
  /** What a selection without any condition holds. */
  firstPreview?: SamplePreview;
}

/** Saved selections of stars, and one that is being made, with what it holds at each change. */
export function SamplesScreen(props: SamplesScreenProps) {
  const { collaboration, surveys, initial, counts, firstPreview } = props;
  const { data: samples = initial, mutate } = useSamples(collaboration, initial);
  const [draft, setDraft] = useState<SampleDraft>(EMPTY_DRAFT);
  const schema = useSchema(loadSchema);
  const read = schema && readDraft(draft, schema);
  const definition = read?.definition;
  const asked = useDeferredValue(definition);
  const { data, error, isLoading } = useSamplePreview(collaboration, asked);
  const preview = data ?? firstPreview;

  const saving = useVersionSave<SampleView>(async ({ name, versionOf }) => {
    if (!definition) throw new Error('what is saved was not checked');
    const saved = await createSample(collaboration, { name, definition, versionOf });
    await mutate();
    return saved;
  });
  const { open } = saving;
  const show = (sample: SampleView | undefined) => {
    saving.show(sample);
    setDraft(sample ? draftOf(sample.definition) : EMPTY_DRAFT);
  };
  const fault =
    saving.name.trim() === ''
      ? 'Give it a name first.'
      : read === undefined
        ? CHECKS_COME
        : read.faults
          ? 'The form holds something that is no selection.'
          : undefined;

  return (
    <>
      <PageTitle
        title="Samples"
        context="Selections of stars that analyses rest on. A star chosen because a companion was known is left out unless a sample keeps it."
      />
      <StarTabs
        collaboration={collaboration}
        current="samples"
        stars={counts.stars}
        undecided={counts.undecided}
      />
      <div className="grid gap-x-14 gap-y-8 pb-10 xl:grid-cols-[420px_1fr]">
        <section className="min-w-0">
          <SectionOpener
            number={1}
            title="Which stars"
            context={open ? `${open.key}, version ${open.version}` : 'a new sample'}
            tools={
              open && (
                <>
                  <ExportButton
                    collaboration={collaboration}
                    source={['samples', open.id]}
                    title={`Files of ${open.key}, version ${open.version}`}
                    look="text"
                  />
                  <TextAction onClick={() => show(undefined)}>New sample</TextAction>
                </>
              )
            }
          />
          <SampleForm
            draft={draft}
            faults={read?.faults}
            surveys={surveys}
            groups={preview?.movingGroups ?? []}
            onChange={setDraft}
          />
          <div className="mt-5 grid gap-4">
            <SaveVersion
              saving={saving}
              noun="sample"
              canSaveVersion={open?.can.saveVersion === true}
              fault={fault}
            />
          </div>
        </section>
        <div className="grid min-w-0 content-start gap-8">
          <section className="min-w-0">
            <SectionOpener
              number={2}
              title="What it holds"
              help="sample"
              context="now, before it is saved"
            />
            {error !== undefined && (
              <Notice tone="bad" title="It could not be counted.">
                {sentenceOf(error)}
              </Notice>
            )}
            {preview ? (
              <SampleCounts
                preview={preview}
                isOld={data !== undefined && (isLoading || definition === undefined)}
              />
            ) : (
              error === undefined && <p className="text-ink3">The stars are being counted.</p>
            )}
          </section>
          <section className="min-w-0">
            <SectionOpener number={3} title="Saved" context="a version never changes" />
            {samples.length === 0 ? (
              <p className="text-ink2">
                No sample yet. Without one, an analysis takes every star of its surveys.
              </p>
            ) : (
              <SampleTable samples={samples} openId={open?.id} onOpen={show} />
            )}
          </section>
        </div>
      </div>
    </>
  );
}
