'use client';

import { ProportionalTo } from '@/components/ui/notation';
import { NumberField } from '@/components/ui/number-field';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import { freeIndicesSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { readNumber, useSettingsForm } from '../use-settings-form';

const usual = freeIndicesSettingsSchema.parse({ kind: 'free-indices' });
const quoted = (stored: number) => String(Number(fromLogIndex(stored, 'linear').toFixed(9)));
const stored = (text: string) => {
  const value = readNumber(text);
  return value === undefined ? text : toLogIndex(value, 'linear');
};

const fields = [
  { name: 'massIndex.min', label: 'Mass index α from' },
  { name: 'massIndex.max', label: 'to' },
  { name: 'semiMajorAxisIndex.min', label: 'Semi-major-axis index β from' },
  { name: 'semiMajorAxisIndex.max', label: 'to' },
];

export function FreeIndicesForm(props: FormProps<'free-indices'>) {
  const start = props.start ?? usual;
  const form = useSettingsForm({
    schema: freeIndicesSettingsSchema,
    start: {
      'massIndex.min': quoted(start.massIndex.min),
      'massIndex.max': quoted(start.massIndex.max),
      'semiMajorAxisIndex.min': quoted(start.semiMajorAxisIndex.min),
      'semiMajorAxisIndex.max': quoted(start.semiMajorAxisIndex.max),
    },
    read: (draft) => ({
      kind: 'free-indices',
      massIndex: { min: stored(draft['massIndex.min']), max: stored(draft['massIndex.max']) },
      semiMajorAxisIndex: {
        min: stored(draft['semiMajorAxisIndex.min']),
        max: stored(draft['semiMajorAxisIndex.max']),
      },
    }),
    faults: props.faults,
    onAsk: props.onAsk,
  });
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note={
        <>
          Uniform between these ends. Indices of d<i>N</i>/d<i>M</i>
          <ProportionalTo />
          <i>M</i>
          <sup>α</sup> and d<i>N</i>/d<i>a</i>
          <ProportionalTo />
          <i>a</i>
          <sup>β</sup>; each detection weighs them by its own mass and semi-major axis.
        </>
      }
    >
      {fields.map(({ name, label }) => (
        <div key={name} className={`max-md:w-[calc(50%-10px)] ${label === 'to' ? 'w-24' : 'w-52'}`}>
          <NumberField {...form.field(name)} label={label} />
        </div>
      ))}
    </SettingsFrame>
  );
}
