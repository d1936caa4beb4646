'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { usePopulations } from '@/components/hooks/use-populations';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { comparisonSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';

export function ComparisonForm(props: FormProps<'population-comparison'>) {
  const { asked, start } = props;
  const { data: populations, error } = usePopulations(asked.collaboration);
  const own = asked.inputs.population;
  const others = populations?.filter(({ id }) => id !== own.id);
  const form = useSettingsForm({
    schema: comparisonSettingsSchema,
    start: { populationIds: start?.populationIds.join() ?? '' },
    read: (draft) => ({
      kind: 'population-comparison',
      populationIds: draft.populationIds === '' ? [] : draft.populationIds.split(','),
    }),
    faults: props.faults,
    onAsk: props.onAsk,
  });
  const chosen = new Set(form.draft.populationIds.split(',').filter(Boolean));
  const toggle = (id: string, isChosen: boolean) => {
    const next = new Set(chosen);
    if (isChosen) next.add(id);
    else next.delete(id);
    form.set('populationIds', [...next].join());
  };
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note={`Each is weighed against ${own.key} ${own.name}, version ${own.version}, with the same stars, detections and rate prior.`}
    >
      <fieldset className="min-w-0 max-md:w-full">
        <legend className="mb-1 text-ink2 text-note">Populations, up to eight</legend>
        {error !== undefined && <p className="text-bad text-note">{sentenceOf(error)}</p>}
        {others === undefined && error === undefined && (
          <p className="text-ink3 text-note" role="status">
            Fetching the populations
          </p>
        )}
        {others?.length === 0 && (
          <p className="text-ink2 text-note">
            There is no other population yet: build one under Populations first.
          </p>
        )}
        <div className="grid max-h-64 gap-x-8 overflow-y-auto md:grid-cols-2">
          {others?.map((population) => (
            <CheckboxField
              key={population.id}
              name="populationIds"
              checked={chosen.has(population.id)}
              onChange={(event) => toggle(population.id, event.target.checked)}
              label={`${population.key} ${population.name}, version ${population.version}`}
            />
          ))}
        </div>
        {form.errors.populationIds !== undefined && (
          <p className="mt-1 text-bad text-note" role="alert">
            {form.errors.populationIds}
          </p>
        )}
      </fieldset>
    </SettingsFrame>
  );
}
