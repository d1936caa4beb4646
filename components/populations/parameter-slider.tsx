'use client';

import type { ReactNode } from 'react';
import { TraceSlider } from '@/components/charts/trace-slider';
import type { LiveSample } from '@/components/runs/live-sample';
import { trackOf } from '@/components/runs/tracks';
import { useLiveTask } from '@/components/runs/use-live-task';
import { formatPercent } from '@/lib/quantities/display';
import type { BuilderSetting } from './builder-setting';
import { formatIndex } from './law-notation';
import {
  definitionOf,
  type LawParameter,
  partsOf,
  readParameter,
  withParameter,
} from './law-parts';

const STEPS = 16;

interface ParameterSliderProps {
  name: string;
  symbol: string;
  label: ReactNode;
  parameter: LawParameter;
  /** The setting when nothing was being dragged last: the track follows it. */
  settled: BuilderSetting;
  sample: LiveSample | undefined;
  /** As stored. */
  value: number;
  savedValue?: number;
  /** Ends of the track as shown. */
  track: readonly [number, number];
  /** Numbers under the track, where even steps would be wrong. */
  ticks?: number[];
  step: number;
  /** From the stored number to the shown one and back. */
  toShown(value: number): number;
  fromShown(shown: number): number;
  onChange(value: number, isSettled: boolean): void;
}

const tidy = (value: number, digits = 6) => Number(value.toPrecision(digits));

/** One number of a law; its track is the limit that each of its values would give. */
export function ParameterSlider(props: ParameterSliderProps) {
  const { parameter, settled, sample, value, savedValue, toShown, fromShown } = props;
  const shown = tidy(toShown(value));
  const savedShown = savedValue === undefined ? undefined : tidy(toShown(savedValue));
  const [min, max] = trackOf(props.track, shown, savedShown ?? shown);
  const values = Array.from({ length: STEPS + 1 }, (_, i) =>
    tidy(fromShown(min + (i * (max - min)) / STEPS), 9),
  );
  const parts = partsOf(settled.definition);
  const { prior, credibleLevel } = settled;
  // The track does not depend on where on it the value lies.
  const definition = definitionOf(withParameter(parts, parameter, values[0]));
  const holdsIt = readParameter(parts, parameter) !== undefined;
  const { answer } = useLiveTask(
    holdsIt ? sample : undefined,
    'parameterTrace',
    { definition, prior, credibleLevel },
    parameter,
    values,
  );
  const isThere = sample !== undefined && answer?.limits.some(Number.isFinite);
  return (
    <TraceSlider
      name={props.name}
      symbol={props.symbol}
      label={props.label}
      trace={
        answer && isThere
          ? {
              parameter: Float64Array.from(answer.values, toShown),
              limit: Float64Array.from(answer.limits),
            }
          : undefined
      }
      value={shown}
      savedValue={savedShown}
      min={min}
      max={max}
      step={props.step}
      ticks={props.ticks}
      onChange={(next, isSettled) => props.onChange(tidy(fromShown(next), 9), isSettled)}
      formatLimit={(limit) => (Number.isFinite(limit) ? formatPercent(limit) : 'no limit')}
      formatValue={formatIndex}
    />
  );
}
