'use client';

import { CheckboxField } from '@/components/ui/checkbox-field';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { formatRate } from '@/lib/quantities/display';
import { forecastSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { useSettingsForm } from '../use-settings-form';
import { CellGrid } from './cell-grid';
import {
  addRow,
  CURVE_ROWS,
  curveColumns,
  curveGrid,
  draftOfForecast,
  pasteCells,
  readForecast,
  removeRow,
  TARGET_ROWS,
  targetColumns,
  targetGrid,
} from './forecast-draft';

type Form = ReturnType<typeof useSettingsForm>;

/** A planned survey: so many stars like those of the run, or a list of targets with one curve. */
export function ForecastForm(props: FormProps<'forecast'>) {
  const { asked, start } = props;
  const form = useSettingsForm({
    schema: forecastSettingsSchema,
    start: draftOfForecast(start),
    read: readForecast,
    faults: props.faults,
    onAsk: props.onAsk,
  });
  const isList = form.draft['planned.kind'] === 'targets';
  const isFraction = asked.quantity === 'host_fraction';
  const unit = isFraction ? '%' : undefined;
  const { answer } = asked.result;
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note={`Population, prior, likelihood and level are those of ${asked.analysis.key}, run ${asked.run.number}. Left empty, the rate is what that run knows (median ${formatRate(answer.median, asked.quantity)}) with its width, and the wanted limit is half of its own.`}
    >
      <div className="w-72 max-md:w-full">
        <TextField {...form.field('name')} label="Name" autoComplete="off" />
      </div>
      <div className="w-72 max-md:w-full">
        <SelectField
          {...form.field('planned.kind')}
          label="Planned"
          options={[
            { value: 'stars-like-these', label: 'stars like those of the run' },
            { value: 'targets', label: 'targets of a list, one assumed curve' },
          ]}
        />
      </div>
      <div className="w-40 max-md:w-full">
        <NumberField
          {...form.field('assumedRate')}
          label={isFraction ? 'Assumed host fraction' : 'Assumed rate per 100'}
          placeholder="as known"
          unit={unit}
        />
      </div>
      <div className="w-40 max-md:w-full">
        <NumberField
          {...form.field('wantedLimit')}
          label={isFraction ? 'Wanted limit' : 'Wanted limit per 100'}
          placeholder="half"
          unit={unit}
        />
      </div>
      {isList ? (
        <TargetList form={form} />
      ) : (
        <LikeThese form={form} surveys={asked.inputs.surveys} />
      )}
    </SettingsFrame>
  );
}

function LikeThese({ form, surveys }: { form: Form; surveys: { id: string; name: string }[] }) {
  const chosen = form.draft['planned.surveyIds'].split(',').filter(Boolean);
  const toggle = (id: string, isChosen: boolean) => {
    const next = isChosen ? [...chosen, id] : chosen.filter((one) => one !== id);
    form.set('planned.surveyIds', next.join());
  };
  return (
    <div className="flex w-full flex-wrap items-start gap-x-5 gap-y-3">
      <div className="w-32 max-md:w-full">
        <NumberField {...form.field('planned.count')} label="Stars" step={1} />
      </div>
      <div className="w-44 max-md:w-full">
        <NumberField {...form.field('planned.deeperByMag')} label="Curves deeper by" unit="mag" />
      </div>
      {surveys.length > 1 && (
        <fieldset className="min-w-0">
          <legend className="mb-1 text-ink2 text-note">
            Like the stars of {chosen.length === 0 ? 'every survey, or only of' : 'only'}
          </legend>
          <div className="flex flex-wrap gap-x-6">
            {surveys.map(({ id, name }) => (
              <CheckboxField
                key={id}
                checked={chosen.includes(id)}
                onChange={(event) => toggle(id, event.target.checked)}
                label={name}
              />
            ))}
          </div>
        </fieldset>
      )}
    </div>
  );
}

function TargetList({ form }: { form: Form }) {
  const { draft, field, setDraft } = form;
  const grid = (of: typeof targetGrid) => ({
    keyOf: of.keyOf,
    field,
    onAdd: () => setDraft((last) => addRow(last, of)),
    onRemove: (row: number) => setDraft((last) => removeRow(last, row, of)),
    onPaste: (row: number, column: number, text: string) => {
      const next = pasteCells(draft, [row, column], text, of);
      if (next) setDraft(next);
      return next !== undefined;
    },
  });
  return (
    <div className="grid w-full min-w-0 grid-cols-[minmax(0,1fr)] gap-x-10 gap-y-5 xl:grid-cols-[minmax(0,1fr)_340px]">
      <div className="min-w-0">
        <h3 className="mb-1 text-ink2 text-note">
          Targets. Cells of a spreadsheet may be pasted into a field, in the order of these columns.
        </h3>
        <CellGrid
          caption="Planned targets"
          rowName="target"
          rows={Number(draft[TARGET_ROWS])}
          columns={targetColumns}
          {...grid(targetGrid)}
        />
      </div>
      <div className="min-w-0">
        <h3 className="mb-1 text-ink2 text-note">
          The contrast curve that each of them is assumed to get
        </h3>
        <div className="mb-2 grid grid-cols-2 gap-3">
          <TextField {...field('planned.curve.band')} label="Band" autoComplete="off" />
          <NumberField {...field('planned.curve.nSigma')} label="Threshold" unit="σ" />
        </div>
        <CellGrid
          caption="Assumed contrast curve"
          rowName="point"
          rows={Number(draft[CURVE_ROWS])}
          columns={curveColumns}
          {...grid(curveGrid)}
        />
      </div>
    </div>
  );
}
