'use client';

import { useMemo } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useCoolingTables } from '@/components/hooks/use-surveys';
import { recipeOfRun } from '@/components/runs/run-recipe';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { SelectField } from '@/components/ui/select-field';
import { systematicsSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';
import { changesOffered, keyOf } from './changes-offered';

const CHOICE = 'which';

export function SystematicsForm(props: FormProps<'systematics'>) {
  const { asked, start } = props;
  const { data: tables, error } = useCoolingTables(asked.collaboration);
  const { stars } = asked.inputs;
  const groups = useMemo(() => {
    return changesOffered({
      tables: tables ?? [],
      hasSharedStars: stars.some(({ surveys }) => surveys.length > 1),
      ruleInRun: recipeOfRun(asked.run)?.combination,
      also: start?.changes ?? [],
    });
  }, [tables, stars, asked, start]);
  const form = useSettingsForm({
    schema: systematicsSettingsSchema,
    start: {
      [CHOICE]: start?.changes ? 'chosen' : 'all',
      ...Object.fromEntries((start?.changes ?? []).map((change) => [keyOf(change), 'true'])),
    },
    read: (draft) => {
      if (draft[CHOICE] === 'all') return { kind: 'systematics' };
      const chosen = groups
        .flatMap(({ changes }) => changes)
        .filter(({ key }) => draft[key] === 'true');
      return { kind: 'systematics', changes: chosen.map(({ change }) => change) };
    },
    faults: props.faults,
    onAsk: props.onAsk,
  });
  const isChosen = form.draft[CHOICE] === 'chosen';
  const count = groups
    .flatMap(({ changes }) => changes)
    .filter(({ key }) => form.draft[key] === 'true').length;
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={
        props.disabledReason ??
        (isChosen && count === 0 ? 'Choose at least one change.' : undefined)
      }
      error={form.errors['']}
      onSubmit={form.submit}
      note="One assumption at a time is changed and the limit asked again, everything else as in the run. Maps that a change touches are made anew; uploaded maps have no curve and stay."
    >
      <div className="w-80 max-md:w-full">
        <SelectField
          {...form.field(CHOICE)}
          label="Changes"
          options={[
            { value: 'all', label: 'all that the surveys of this run allow' },
            { value: 'chosen', label: 'those that I choose' },
          ]}
        />
      </div>
      {isChosen && (
        <div className="md:order-last w-full columns-3 gap-x-10 max-xl:columns-2 max-md:columns-1">
          {error !== undefined && (
            <p className="text-bad text-note">
              Cooling tables could not be fetched: {sentenceOf(error)}
            </p>
          )}
          {groups.map((group) => (
            <fieldset key={group.name} className="mb-3 min-w-0 break-inside-avoid">
              <legend className="mb-1 font-semibold text-note">{group.name}</legend>
              {group.changes.map(({ key, name, sentence }) => (
                <CheckboxField key={key} {...form.check(key)} label={name} hint={sentence} />
              ))}
            </fieldset>
          ))}
        </div>
      )}
    </SettingsFrame>
  );
}
