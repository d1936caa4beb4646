import type { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { NumberField } from '@/components/ui/number-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';

/** What a survey is called and when it observed; how its maps are made is asked elsewhere. */
export const loadSurveyFacts = async () =>
  (await import('@/lib/schemas/surveys')).surveyFactsSchema;

type SurveyFacts = Awaited<ReturnType<typeof loadSurveyFacts>>;
type SurveyFactsForm = ReturnType<typeof useSchemaForm<SurveyFacts>>;

const asYear = {
  setValueAs: (text: unknown) => (text === '' || text === null ? null : Number(text)),
};

export function SurveyFields({ field }: Pick<SurveyFactsForm, 'field'>) {
  return (
    <>
      <TextField label="Name" required {...field('name')} />
      <TextField
        label="Band of the contrast curves"
        hint="As in the magnitude columns: H, K, L"
        required
        {...field('band')}
      />
      <NumberField label="First year" step={1} {...field('observedFrom', asYear)} />
      <NumberField label="Last year" step={1} {...field('observedTo', asYear)} />
      <div className="md:col-span-2">
        <TextAreaField label="What it searched for" {...field('description')} />
      </div>
    </>
  );
}
