'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { usePopulations } from '@/components/hooks/use-populations';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { calibrationSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { readNumber, useSettingsForm } from '../use-settings-form';
import { percentages, readPercentages } from './calibration-words';

const USUAL_LEVELS = [0.5, 0.68, 0.9, 0.95, 0.99];
const USUAL_SURVEYS = 1000;

export function CalibrationForm(props: FormProps<'calibration'>) {
  const { asked, start } = props;
  const { data: populations, error } = usePopulations(asked.collaboration);
  const own = asked.inputs.population;
  const form = useSettingsForm({
    schema: calibrationSettingsSchema,
    start: {
      surveys: String(start?.surveys ?? USUAL_SURVEYS),
      levels: percentages(start?.levels ?? USUAL_LEVELS),
      truths: percentages(start?.truths),
      truthPopulationId: start?.truthPopulationId ?? '',
      seed: start?.seed ?? '',
    },
    read: (draft) => ({
      kind: 'calibration',
      surveys: readNumber(draft.surveys) ?? draft.surveys,
      levels: readPercentages(draft.levels),
      ...(draft.truths.trim() !== '' && { truths: readPercentages(draft.truths) }),
      ...(draft.truthPopulationId !== '' && { truthPopulationId: draft.truthPopulationId }),
      ...(draft.seed.trim() !== '' && { seed: draft.seed.trim().toLowerCase() }),
    }),
    faults: props.faults.map(ofWholeList),
    onAsk: props.onAsk,
  });
  const others = populations?.filter(({ id }) => id !== own.id) ?? [];
  const rate = asked.quantity === 'host_fraction' ? 'True host fractions' : 'True rates per 100';
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note="Surveys of the run’s own stars are invented: a true rate from the prior, detections by chance, the same analysis. How often the limit then lies above the truth is counted. It is computed in parts, each kept at once."
    >
      <div className="w-32 max-md:w-full">
        <NumberField {...form.field('surveys')} label="Invented surveys" step={100} />
      </div>
      <div className="w-52 max-md:w-full">
        <TextField
          {...form.field('levels')}
          label="Levels"
          trailing="%"
          inputMode="text"
          spellCheck={false}
        />
      </div>
      <div className="w-52 max-md:w-full">
        <TextField
          {...form.field('truths')}
          label={rate}
          placeholder="five over the prior"
          trailing={asked.quantity === 'host_fraction' ? '%' : undefined}
          spellCheck={false}
        />
      </div>
      <div className="w-72 max-md:w-full">
        <SelectField
          {...form.field('truthPopulationId')}
          label="Besides, a truth that follows"
          hint={error === undefined ? undefined : sentenceOf(error)}
          options={[
            { value: '', label: `no other than ${own.key} ${own.name}` },
            ...others.map((one) => ({
              value: one.id,
              label: `${one.key} ${one.name}, version ${one.version}`,
            })),
          ]}
        />
      </div>
      <div className="w-40 max-md:w-full">
        <TextField
          {...form.field('seed')}
          label="Seed"
          placeholder="from the run"
          spellCheck={false}
        />
      </div>
    </SettingsFrame>
  );
}

/** A fault of one number of a list stands at the field that holds the list. */
function ofWholeList<Placed extends { item?: string }>(fault: Placed): Placed {
  const list = /^(levels|truths)\.\d+$/.exec(fault.item ?? '')?.[1];
  return list === undefined ? fault : { ...fault, item: list };
}
