'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { useCoolingTables } from '@/components/hooks/use-surveys';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { SelectField } from '@/components/ui/select-field';
import { COOLING_BUILT_IN } from '@/lib/schemas/stack-choices';
import { agesCoolingSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';

const CHOICE = 'coolingTableIds';

export function AgesCoolingForm(props: FormProps<'ages-cooling'>) {
  const { asked, start } = props;
  const { data: tables, error } = useCoolingTables(asked.collaboration);
  const models = [
    { key: COOLING_BUILT_IN, id: null, name: 'built-in approximate law' },
    ...(tables ?? []).map(({ id, name }) => ({ key: id, id, name })),
  ];
  const chosen = start?.coolingTableIds;
  const form = useSettingsForm({
    schema: agesCoolingSettingsSchema,
    start: {
      [CHOICE]: chosen ? 'chosen' : 'fitting',
      ...Object.fromEntries((chosen ?? []).map((id) => [id ?? COOLING_BUILT_IN, 'true'])),
    },
    read: (draft) => {
      if (draft[CHOICE] === 'fitting') return { kind: 'ages-cooling' };
      const ids = models.filter(({ key }) => draft[key] === 'true').map(({ id }) => id);
      return { kind: 'ages-cooling', coolingTableIds: ids };
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
      note="For each cooling model the maps are made under five ages, two sigma younger to two sigma older, and kept with the answer: the controls of the result then move between them at once. Uploaded maps have no curve and stay."
    >
      <div className="w-80 max-md:w-full">
        <SelectField
          {...form.field(CHOICE)}
          label="Cooling models beside the run’s own"
          options={[
            { value: 'fitting', label: 'up to two that know all bands' },
            { value: 'chosen', label: 'those that I choose, two at most' },
          ]}
        />
      </div>
      {form.draft[CHOICE] === 'chosen' && (
        <fieldset className="md:order-last w-full min-w-0 columns-3 gap-x-10 max-md:columns-1 max-xl:columns-2">
          <legend className="sr-only">Cooling models</legend>
          {error !== undefined && (
            <p className="text-bad text-note">
              Cooling tables could not be fetched: {sentenceOf(error)}
            </p>
          )}
          {models.map(({ key, name }) => (
            <CheckboxField key={key} {...form.check(key)} label={name} />
          ))}
        </fieldset>
      )}
    </SettingsFrame>
  );
}
