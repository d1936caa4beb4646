'use client';

import { SelectField } from '@/components/ui/select-field';
import { influenceSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';
import { groupNames } from './influence-words';

export function InfluenceForm(props: FormProps<'influence'>) {
  const form = useSettingsForm({
    schema: influenceSettingsSchema,
    start: { groupBy: props.start?.groupBy ?? 'moving-group' },
    read: ({ groupBy }) => ({ kind: 'influence', groupBy }),
    faults: props.faults,
    onAsk: props.onAsk,
  });
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note="Every star, every survey and every group is left out in turn, with the detections that it alone brings. A star in several surveys stays with what the others saw of it."
    >
      <div className="w-60 max-md:w-full">
        <SelectField
          {...form.field('groupBy')}
          label="Stars in groups by"
          options={Object.entries(groupNames).map(([value, label]) => ({ value, label }))}
        />
      </div>
    </SettingsFrame>
  );
}
