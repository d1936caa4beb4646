'use client';

import { overlapRulesSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';

export function OverlapForm(props: FormProps<'overlap-rules'>) {
  const shared = props.asked.inputs.stars.filter(({ surveys }) => surveys.length > 1).length;
  const form = useSettingsForm({
    schema: overlapRulesSettingsSchema,
    start: {},
    read: () => ({ kind: 'overlap-rules' }),
    faults: props.faults,
    onAsk: props.onAsk,
  });
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={
        props.disabledReason ??
        (shared === 0
          ? 'No star of this run is in several surveys: every rule gives its limit.'
          : undefined)
      }
      error={form.errors['']}
      onSubmit={form.submit}
    >
      <p className="max-w-[60ch] text-note">
        {shared === 0
          ? 'No star of this run is in several surveys.'
          : `${shared} of ${props.asked.inputs.stars.length} stars of this run are in several surveys. There is nothing to choose: every rule is tried.`}
      </p>
    </SettingsFrame>
  );
}
