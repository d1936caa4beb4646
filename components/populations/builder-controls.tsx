'use client';

import type { ReactNode } from 'react';
import { NumberEntry } from '@/components/analyses/number-entry';
import { priorLaws, priorOfLaw, priorOptions } from '@/components/analyses/prior-choice';
import { PriorNumbers } from '@/components/analyses/prior-numbers';
import { RangeControl } from '@/components/charts/range-control';
import { TraceSlider } from '@/components/charts/trace-slider';
import type { Trace } from '@/components/runs/consequences';
import { EditableRange } from '@/components/runs/editable-range';
import { tidy } from '@/components/runs/live-setting';
import { TRACK, trackOf } from '@/components/runs/tracks';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import { formatPercent } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { MapGrid } from '@/lib/sensitivity';
import type { BuilderSetting } from './builder-setting';
import { AxisRange, formatIndex, MassRange, PowerLaw } from './law-notation';

interface BuilderControlsProps {
  setting: BuilderSetting;
  saved?: PowerLawDefinition;
  grid: MapGrid;
  /** Where the orbits come from: said, not chosen here. */
  orbits: string;
  profiles?: { mass: Float64Array; semiMajorAxis: Float64Array };
  /** Limits against each linear index; undefined without maps. */
  traces?: { massIndex?: Trace; semiMajorAxisIndex?: Trace };
  /** `isSettled` is false while something is being dragged. */
  onSetting(setting: BuilderSetting, isSettled: boolean): void;
}

/** What a typed range may hold; the maps may end before. */
const TYPED = { mass: [0.01, 1000], axis: [0.01, 100_000] } as const;

/** The parts of a population in the order in which it is described. */
export function BuilderControls(props: BuilderControlsProps) {
  const { setting, saved, grid, orbits, profiles, traces, onSetting } = props;
  const { definition, convention } = setting;
  const redefine = (changes: Partial<PowerLawDefinition>, isSettled: boolean) =>
    onSetting({ ...setting, definition: { ...definition, ...changes } }, isSettled);
  const shift = convention === 'linear' ? 0 : 1;

  const index = (field: 'massIndex' | 'semiMajorAxisIndex', symbol: string, name: string) => {
    const value = tidy(fromLogIndex(definition[field], convention));
    const savedValue = saved && tidy(fromLogIndex(saved[field], convention));
    const trace = traces?.[field];
    const [from, to] = TRACK[field];
    const [min, max] = trackOf([from + shift, to + shift], value, savedValue ?? value);
    return (
      <TraceSlider
        name={name}
        symbol={symbol}
        label={
          <>
            index <i>{symbol}</i>
          </>
        }
        trace={
          trace && {
            parameter: Float64Array.from(trace.values, (linear) => linear + shift),
            limit: Float64Array.from(trace.limits),
          }
        }
        value={value}
        savedValue={savedValue}
        min={min}
        max={max}
        step={0.05}
        onChange={(next, isSettled) =>
          redefine({ [field]: tidy(toLogIndex(next, convention), 9) }, isSettled)
        }
        formatLimit={(limit) => (Number.isFinite(limit) ? formatPercent(limit) : 'no limit')}
        formatValue={formatIndex}
      />
    );
  };
  const bounds = (nodes: Float64Array, low: number, high: number): [number, number] => [
    Math.min(nodes[0], low),
    Math.max(nodes[nodes.length - 1], high),
  ];

  return (
    <div className="rounded-plate bg-well px-5 pt-1.5 pb-3.5 max-md:-mx-[22px] max-md:rounded-none max-md:px-[22px]">
      <div className="pt-3 pb-2.5">
        <ConsequenceSwitch
          label="How indices are quoted"
          size="small"
          value={convention}
          onChange={(next) => onSetting({ ...setting, convention: next }, true)}
          options={[
            { value: 'linear', label: 'linear, dN/dM and dN/da' },
            { value: 'log', label: 'per ln M and ln a' },
          ]}
        />
        <p className="mt-1.5 text-chart text-ink3">
          Stored per natural logarithm: <i>α</i> = {formatIndex(definition.massIndex)}, <i>β</i> ={' '}
          {formatIndex(definition.semiMajorAxisIndex)}.
        </p>
      </div>
      <Part number={1} title="Planet mass" form="power law">
        <p className="mb-2 text-note">
          <PowerLaw variable="mass" definition={definition} convention={convention} />
        </p>
        <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
          {index('massIndex', 'α', 'Mass index')}
          <RangeControl
            name="Planet mass"
            label="range"
            valueLabel={
              <EditableRange
                name="planet mass"
                unit="Jupiter masses"
                min={definition.massMinMjup}
                max={definition.massMaxMjup}
                bounds={[...TYPED.mass]}
                onChange={(massMinMjup, massMaxMjup) =>
                  redefine({ massMinMjup, massMaxMjup }, true)
                }
              >
                <MassRange definition={definition} />
              </EditableRange>
            }
            unitWords="Jupiter masses"
            value={[definition.massMinMjup, definition.massMaxMjup]}
            bounds={bounds(grid.massMjup, definition.massMinMjup, definition.massMaxMjup)}
            onChange={([massMinMjup, massMaxMjup], isSettled) =>
              redefine({ massMinMjup, massMaxMjup }, isSettled)
            }
            profile={profiles && { at: grid.massMjup, height: profiles.mass }}
          />
        </div>
      </Part>
      <Part number={2} title="Semi-major axis" form="power law">
        <p className="mb-2 text-note">
          <PowerLaw variable="semi-major axis" definition={definition} convention={convention} />
        </p>
        <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
          {index('semiMajorAxisIndex', 'β', 'Semi-major-axis index')}
          <RangeControl
            name="Semi-major axis"
            label="range"
            valueLabel={
              <EditableRange
                name="semi-major axis"
                unit="AU"
                min={definition.semiMajorAxisMinAu}
                max={definition.semiMajorAxisMaxAu}
                bounds={[...TYPED.axis]}
                onChange={(semiMajorAxisMinAu, semiMajorAxisMaxAu) =>
                  redefine({ semiMajorAxisMinAu, semiMajorAxisMaxAu }, true)
                }
              >
                <AxisRange definition={definition} />
              </EditableRange>
            }
            unitWords="AU"
            value={[definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu]}
            bounds={bounds(
              grid.semiMajorAxisAu,
              definition.semiMajorAxisMinAu,
              definition.semiMajorAxisMaxAu,
            )}
            onChange={([semiMajorAxisMinAu, semiMajorAxisMaxAu], isSettled) =>
              redefine({ semiMajorAxisMinAu, semiMajorAxisMaxAu }, isSettled)
            }
            profile={profiles && { at: grid.semiMajorAxisAu, height: profiles.semiMajorAxis }}
          />
        </div>
      </Part>
      <Part number={3} title="Orbits" form="with the maps">
        <p className="text-ink2 text-note">{orbits}</p>
      </Part>
      <Part number={4} title="Stars" form="same for all">
        <p className="text-ink2 text-note">Every star draws from one population.</p>
      </Part>
      <Part
        number={5}
        title={
          <>
            Host fraction <i>f</i>
          </>
        }
        form="for this preview"
      >
        <div className="grid gap-3">
          <ConsequenceSwitch
            label={
              <>
                Prior on <i>f</i>
              </>
            }
            size="small"
            value={setting.prior.law}
            onChange={(law) =>
              onSetting(
                { ...setting, prior: priorOfLaw(law, 'host-fraction', setting.prior) },
                true,
              )
            }
            options={priorOptions(priorLaws('host-fraction'))}
          />
          <div className="grid grid-cols-2 gap-4">
            <PriorNumbers
              prior={setting.prior}
              likelihood="host-fraction"
              onChange={(prior) => onSetting({ ...setting, prior }, true)}
            />
            <NumberEntry
              label="If f were"
              unit="%"
              value={tidy(100 * setting.statedFraction)}
              isAllowed={(percent) => percent > 0 && percent <= 100}
              expected="Above 0, at most 100 %."
              onValue={(percent) =>
                onSetting({ ...setting, statedFraction: tidy(percent / 100) }, true)
              }
            />
          </div>
          <p className="text-chart text-ink3">
            An analysis chooses its own prior; the population does not hold one.
          </p>
        </div>
      </Part>
    </div>
  );
}

function Part({
  number,
  title,
  form,
  children,
}: {
  number: number;
  title: ReactNode;
  form: string;
  children: ReactNode;
}) {
  return (
    <section className="border-rule border-t pt-3.5 pb-2">
      <header className="mb-2 flex items-baseline gap-[9px]">
        <span className="text-ink3">{number}</span>
        <h2 className="text-[16px]">{title}</h2>
        <span className="ml-auto text-chart text-ink3">{form}</span>
      </header>
      {children}
    </section>
  );
}
