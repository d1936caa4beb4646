'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { useSamplePreview, useSamples } from '@/components/hooks/use-samples';
import { Link } from '@/components/ui/link';
import { SelectField } from '@/components/ui/select-field';
import type { SampleDefinition, SamplePreview } from '@/lib/schemas/samples';

interface SampleChoiceProps {
  collaboration: string;
  surveyIds: string[];
  chosen: string | undefined;
  onChange(sampleId: string | undefined): void;
}

const EVERY_STAR: SampleDefinition = { knownCompanion: 'left-out', unknown: 'left-out' };

/** Which of the surveys' stars the analysis rests on: all, or those of a saved sample. */
export function SampleChoice({ collaboration, surveyIds, chosen, onChange }: SampleChoiceProps) {
  const { data: samples = [], error } = useSamples(collaboration);
  const sample = samples.find(({ id }) => id === chosen);
  const { data: preview } = useSamplePreview(
    collaboration,
    sample?.definition ?? EVERY_STAR,
    surveyIds,
  );
  const offered = samples.filter(({ isLatest, id }) => isLatest || id === chosen);
  return (
    <div className="mt-3 max-w-[40rem]">
      <SelectField
        label="Stars of these surveys"
        value={chosen ?? ''}
        onChange={(event) => onChange(event.target.value || undefined)}
        error={error && sentenceOf(error)}
        hint={`${sample ? `${sample.words}. ` : ''}${preview ? countWords(preview) : surveyIds.length > 0 ? 'Counting the stars.' : ''}`}
        aside={<Link href={`/${collaboration}/stars/samples`}>Samples</Link>}
        options={[
          { value: '', label: 'All that are not chosen for a known companion' },
          ...offered.map(({ id, key, version, name }) => ({
            value: id,
            label: `${key} version ${version}, ${name}`,
          })),
        ]}
      />
    </div>
  );
}

function countWords({ stars, leftOut }: SamplePreview): string {
  const count = `${stars.selected} of ${stars.all} stars.`;
  const hosts = leftOut.find(({ reason }) => reason.startsWith('chosen because'))?.entries;
  if (hosts === undefined) return count;
  const words = hosts === 1 ? '1 entry was' : `${hosts} entries were`;
  return `${count} ${words} chosen because a companion was known, and left out.`;
}
