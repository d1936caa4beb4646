'use client';

import { NumberField } from '@/components/ui/number-field';
import { formatRate } from '@/lib/quantities/display';
import { countsSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { readNumber, useSettingsForm } from '../use-settings-form';

export function CountsForm(props: FormProps<'counts'>) {
  const { asked, start } = props;
  const isFraction = asked.quantity === 'host_fraction';
  const form = useSettingsForm({
    schema: countsSettingsSchema,
    start: { rate: start?.rate === undefined ? '' : String(100 * start.rate) },
    read: ({ rate }) => {
      if (rate.trim() === '') return { kind: 'counts' };
      const percentage = readNumber(rate);
      return { kind: 'counts', rate: percentage === undefined ? rate : percentage / 100 };
    },
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
        asked.result.counted.length > 0
          ? `Left empty, the rate is the median of the run: ${formatRate(asked.result.answer.median, asked.quantity)}.`
          : `Left empty, the rate is the median of the run, ${formatRate(asked.result.answer.median, asked.quantity)}, which rests on the prior as nothing was detected.`
      }
    >
      <div className="w-64 max-md:w-full">
        <NumberField
          {...form.field('rate')}
          label={isFraction ? 'Host fraction' : 'Planets per 100 stars'}
          placeholder="median of the run"
          unit={isFraction ? '%' : undefined}
        />
      </div>
    </SettingsFrame>
  );
}
