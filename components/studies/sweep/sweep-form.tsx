'use client';

import { JupiterMass, ProportionalTo } from '@/components/ui/notation';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { quotedSweepValue, type SweptParameter, sweptParameters } from '@/lib/inference';
import { toLogIndex } from '@/lib/population';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import { sweepParameterSchema, sweepSettingsSchema } from '@/lib/schemas/study-settings';
import type { FormProps } from '../kind-entry';
import { SettingsFrame } from '../settings-frame';
import { readNumber, useSettingsForm } from '../use-settings-form';
import { ownValue, usualSpan } from './sweep-parameters';

const FIRST: SweptParameter = 'semi-major-axis-max';
/** A plane of both takes the square of it. */
const countOf = (over: SweptParameter) => (over === 'both-indices' ? '21' : '31');
const plain = (value: number) => String(Number(value.toPrecision(6)));

export function SweepForm(props: FormProps<'sweep'>) {
  const { asked, start } = props;
  const spanOf = (over: SweptParameter) => {
    const span = usualSpan(over, asked);
    return {
      over,
      from: plain(quotedSweepValue(over, span.from)),
      to: plain(quotedSweepValue(over, span.to)),
      count: countOf(over),
    };
  };
  const form = useSettingsForm({
    schema: sweepSettingsSchema,
    start: start
      ? {
          over: start.over,
          from: plain(quotedSweepValue(start.over, start.from)),
          to: plain(quotedSweepValue(start.over, start.to)),
          count: String(start.count),
        }
      : spanOf(FIRST),
    read: (draft) => {
      const isIndex = sweptParameters[draft.over as SweptParameter].unit === 'index';
      const stored = (text: string) => {
        const value = readNumber(text);
        return isIndex && value !== undefined ? toLogIndex(value, 'linear') : (value ?? text);
      };
      return {
        kind: 'sweep',
        over: draft.over,
        from: stored(draft.from),
        to: stored(draft.to),
        count: readNumber(draft.count) ?? draft.count,
      };
    },
    faults: props.faults,
    onAsk: props.onAsk,
  });
  const over = form.draft.over as SweptParameter;
  const { unit } = sweptParameters[over];
  const unitSign = unit === 'index' ? undefined : unit === 'MJ' ? <JupiterMass /> : unit;
  const own = ownValue(over, asked);
  return (
    <SettingsFrame
      isBusy={props.isBusy}
      disabledReason={props.disabledReason}
      error={form.errors['']}
      onSubmit={form.submit}
      note={
        <>
          {unit === 'index' && (
            <>
              Indices of d<i>N</i>/d<i>M</i>
              <ProportionalTo />
              <i>M</i>
              <sup>α</sup> and d<i>N</i>/d<i>a</i>
              <ProportionalTo />
              <i>a</i>
              <sup>β</sup>.{' '}
            </>
          )}
          {own === undefined ? (
            'Everything else stays as in the run.'
          ) : (
            <>
              The run used {formatPlain(quotedSweepValue(over, own))}
              {unitSign !== undefined && (
                <>
                  {THIN_SPACE}
                  {unitSign}
                </>
              )}
              ; everything else stays as in the run.
            </>
          )}
        </>
      }
    >
      <div className="w-60 max-md:w-full">
        <SelectField
          {...form.field('over')}
          label="Limit against"
          options={sweepParameterSchema.options.map((value) => ({
            value,
            label: sweptParameters[value].name,
          }))}
          onChange={(event) => form.setDraft(spanOf(event.target.value as SweptParameter))}
        />
      </div>
      {(['from', 'to'] as const).map((name) => (
        <div key={name} className="w-32 max-md:w-[calc(50%-10px)]">
          <NumberField
            {...form.field(name)}
            label={name === 'from' ? 'From' : 'To'}
            unit={unitSign}
          />
        </div>
      ))}
      <div className="w-24 max-md:w-full">
        <NumberField {...form.field('count')} label="Values" step={1} />
      </div>
    </SettingsFrame>
  );
}
