'use client';

import { CheckboxField } from '@/components/ui/checkbox-field';
import { limitMapSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';

export function LimitMapForm(props: FormProps<'limit-map'>) {
  const { massMjup, semiMajorAxisAu } = props.asked.inputs.grid;
  const form = useSettingsForm({
    schema: limitMapSettingsSchema,
    start: { tailCumulative: String(props.start?.tailCumulative ?? false) },
    read: (draft) => ({ kind: 'limit-map', tailCumulative: draft.tailCumulative === 'true' }),
    faults: props.faults,
    onAsk: props.onAsk,
  });
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note={`${massMjup.length} × ${semiMajorAxisAu.length} limits on the grid of the run, each with no detection and all companions at that place.`}
    >
      <CheckboxField
        {...form.check('tailCumulative')}
        label="Also for the part of the population beyond each place"
        hint="The population cut to companions at least as heavy and as wide, with the detections inside."
      />
    </SettingsFrame>
  );
}
