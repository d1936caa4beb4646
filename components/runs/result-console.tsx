'use client';

import { type ReactNode, useMemo, useState } from 'react';
import { RangeControl } from '@/components/charts/range-control';
import { TraceSlider } from '@/components/charts/trace-slider';
import { AxisRange, formatIndex, MassRange } from '@/components/populations/law-notation';
import { Console } from '@/components/ui/console';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel, type RateQuantity } from '@/lib/inference';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import { formatPercent, formatSignificant } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import type { MapGrid } from '@/lib/sensitivity';
import type { Consequences } from './consequences';
import { formatShift, shiftsOf } from './input-choices';
import { type LiveSetting, tidy, withInputs } from './live-setting';
import { ResultSwitches, type ResultSwitchesProps } from './result-switches';
import { TRACK, TYPED_LEVEL, trackOf } from './tracks';

interface ResultConsoleProps extends Omit<ResultSwitchesProps, 'further'> {
  grid: MapGrid;
  profiles?: { mass: Float64Array; semiMajorAxis: Float64Array };
  /** In the place of the controls of ages and cooling, where no maps are kept for them. */
  offer?: ReactNode;
}

const LEVEL_TICKS = [50, 68, 80, 95];

const orNoLimit = (words: (limit: number) => string) => (limit: number) =>
  Number.isFinite(limit) ? words(limit) : 'no limit';

/** One function a quantity, so that a track is not drawn anew for it. */
const limitWords: Record<RateQuantity, (limit: number) => string> = {
  host_fraction: orNoLimit((limit) => formatPercent(limit)),
  companions_per_star: orNoLimit((limit) => formatSignificant(100 * limit, 2)),
};

/** Ranges, indices and level over their consequences, then the switches that carry theirs. */
export function ResultConsole(props: ResultConsoleProps) {
  const { setting, saved, quantity, grid, consequences, profiles, onSetting } = props;
  const [isFull, setFull] = useState(false);
  const { definition } = setting;
  const further = isFull ? '' : 'max-md:hidden';
  const redefine = (changes: Partial<PowerLawDefinition>) =>
    onSetting({ ...setting, definition: { ...definition, ...changes } });
  const limit = limitWords[quantity];
  const tracks = useMemo(() => consequences && tracksOf(consequences), [consequences]);
  const levelWords = `at ${describeLevel(setting.credibleLevel).replace('\u2009%', ' per cent')}`;

  const index = (
    field: 'massIndex' | 'semiMajorAxisIndex',
    names: { name: string; symbol: string; label: ReactNode },
  ) => {
    const value = tidy(fromLogIndex(definition[field], 'linear'));
    const savedValue = tidy(fromLogIndex(saved.definition[field], 'linear'));
    const [min, max] = trackOf(TRACK[field], value, savedValue);
    return (
      <TraceSlider
        {...names}
        help="index-convention"
        trace={tracks?.[field]}
        value={value}
        savedValue={savedValue}
        min={min}
        max={max}
        step={0.05}
        onChange={(next) => redefine({ [field]: tidy(toLogIndex(next, 'linear'), 9) })}
        formatLimit={limit}
        formatValue={formatIndex}
        levelWords={levelWords}
      />
    );
  };
  const [levelMin, levelMax] = trackOf(TRACK.level, setting.credibleLevel, saved.credibleLevel);

  return (
    <Console
      columns={props.inputs ? 6 : 5}
      foot={
        <>
          <ResultSwitches {...props} further={further} />
          {props.offer !== undefined && (
            <div className={`max-md:w-full ${further}`}>{props.offer}</div>
          )}
          <p className="ml-auto max-w-[170px] text-right text-chart text-ink3 leading-[1.3] max-md:hidden">
            Each choice carries the limit it would give,{' '}
            {quantity === 'host_fraction'
              ? 'in %; of Poisson planets per 100 stars'
              : 'in planets per 100 stars'}
          </p>
          <TextAction
            className="mx-auto font-semibold md:hidden"
            icon="down"
            aria-expanded={isFull}
            onClick={() => setFull(!isFull)}
          >
            {isFull ? 'Fewer controls' : 'More controls'}
          </TextAction>
        </>
      }
    >
      <ControlCell className={further}>
        <RangeControl
          name="Planet mass"
          valueLabel={<MassRange definition={definition} />}
          unitWords="Jupiter masses"
          value={[definition.massMinMjup, definition.massMaxMjup]}
          bounds={boundsOf(grid.massMjup, definition.massMinMjup, definition.massMaxMjup)}
          onChange={([massMinMjup, massMaxMjup]) => redefine({ massMinMjup, massMaxMjup })}
          profile={profiles && { at: grid.massMjup, height: profiles.mass }}
        />
      </ControlCell>
      <ControlCell>
        <RangeControl
          name="Semi-major axis"
          valueLabel={<AxisRange definition={definition} />}
          unitWords="AU"
          value={[definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu]}
          bounds={boundsOf(
            grid.semiMajorAxisAu,
            definition.semiMajorAxisMinAu,
            definition.semiMajorAxisMaxAu,
          )}
          onChange={([semiMajorAxisMinAu, semiMajorAxisMaxAu]) =>
            redefine({ semiMajorAxisMinAu, semiMajorAxisMaxAu })
          }
          profile={profiles && { at: grid.semiMajorAxisAu, height: profiles.semiMajorAxis }}
        />
      </ControlCell>
      <ControlCell>
        {index('massIndex', {
          name: 'Mass index',
          symbol: 'α',
          label: (
            <>
              Mass index <i>α</i>
            </>
          ),
        })}
      </ControlCell>
      <ControlCell className={further}>
        {index('semiMajorAxisIndex', {
          name: 'Semi-major-axis index',
          symbol: 'β',
          label: (
            <>
              Axis index <i>β</i>
            </>
          ),
        })}
      </ControlCell>
      {props.inputs && (
        <ControlCell className={further}>
          <TraceSlider
            name="Age shift"
            label="Age shift, all stars"
            help="age-shift"
            trace={tracks?.age}
            value={setting.ageShift ?? 0}
            savedValue={saved.ageShift ?? 0}
            {...shiftEnds(props.inputs, setting)}
            step={0.1}
            ticks={props.inputs.result.ageShifts}
            onChange={(next) => onSetting(withInputs(setting, { ageShift: tidy(next, 3) }))}
            formatLimit={limit}
            formatValue={formatShift}
            levelWords={levelWords}
          />
        </ControlCell>
      )}
      <ControlCell className={further}>
        <TraceSlider
          name="Credible level"
          help="credible-level"
          trace={tracks?.level}
          value={tidy(100 * setting.credibleLevel)}
          savedValue={tidy(100 * saved.credibleLevel)}
          min={100 * levelMin}
          max={100 * levelMax}
          typed={TYPED_LEVEL}
          step={0.5}
          ticks={LEVEL_TICKS}
          onChange={(next) => onSetting({ ...setting, credibleLevel: tidy(next / 100) })}
          formatLimit={limit}
          formatValue={(value) => describeLevel(value / 100)}
        />
      </ControlCell>
    </Console>
  );
}

/** A cell without a head of its own: the controls bring theirs. */
function ControlCell({ className = '', children }: { className?: string; children: ReactNode }) {
  return (
    <div
      className={`min-w-0 border-rule md:px-4 xl:border-l xl:first:border-l-0 md:max-xl:not-[:nth-child(3n+1)]:border-l xl:first:pl-0 md:max-xl:[:nth-child(3n+1)]:pl-0 xl:last:pr-0 ${className}`}
    >
      {children}
    </div>
  );
}

/** The axis of a control is the map's own, unless the range reaches past it. */
function boundsOf(nodes: Float64Array, min: number, max: number): [number, number] {
  return [Math.min(nodes[0], min), Math.max(nodes[nodes.length - 1], max)];
}

/** The same objects as long as the consequences are the same. */
function tracksOf({ massIndex, semiMajorAxisIndex, level, age }: Consequences) {
  return {
    massIndex: asTrace(massIndex),
    semiMajorAxisIndex: asTrace(semiMajorAxisIndex),
    level: asTrace(percent(level)),
    age: age === null ? undefined : asTrace(withoutGaps(age)),
  };
}

function asTrace({ values, limits }: { values: number[]; limits: number[] }) {
  return { parameter: Float64Array.from(values), limit: Float64Array.from(limits) };
}

/** The track ends where maps do. */
function withoutGaps({ values, limits }: { values: number[]; limits: number[] }) {
  const isThere = limits.map((limit) => Number.isFinite(limit));
  return {
    values: values.filter((_, i) => isThere[i]),
    limits: limits.filter((_, i) => isThere[i]),
  };
}

function shiftEnds(inputs: AgesCoolingAnswer, { cooling, ageShift = 0 }: LiveSetting) {
  const [min, max] = shiftsOf(inputs, cooling);
  return { min: Math.min(min, ageShift), max: Math.max(max, ageShift) };
}

function percent({ values, limits }: { values: number[]; limits: number[] }) {
  return { values: values.map((level) => 100 * level), limits };
}
