'use client';

import type { LiveSample } from '@/components/runs/live-sample';
import type { MapGrid } from '@/lib/sensitivity';
import { BuilderPart } from './builder-part';
import type { BuilderSetting } from './builder-setting';
import { FractionPart } from './fraction-part';
import { HostPart } from './host-part';
import { LawPart } from './law-part';
import { type LawAxis, type LawDefinition, partsOf } from './law-parts';

interface BuilderControlsProps {
  setting: BuilderSetting;
  settled: BuilderSetting;
  saved?: LawDefinition;
  grid: MapGrid;
  sample: LiveSample | undefined;
  /** Where the orbits come from: said, not chosen here. */
  orbits: string;
  profiles?: Record<LawAxis, Float64Array>;
  /** `isSettled` is false while something is being dragged. */
  onSetting(setting: BuilderSetting, isSettled: boolean): void;
}

/** The parts of a population in the order in which it is described. */
export function BuilderControls(props: BuilderControlsProps) {
  const { setting, settled, saved, grid, sample, orbits, profiles, onSetting } = props;
  const shared = {
    setting,
    settled,
    sample,
    onSetting,
    parts: partsOf(setting.definition),
    saved: saved && partsOf(saved),
  };
  return (
    <div className="rounded-plate bg-well px-5 pt-1.5 pb-3.5 max-md:-mx-[22px] max-md:rounded-none max-md:px-[22px]">
      <LawPart {...shared} number={1} axis="mass" nodes={grid.massMjup} profile={profiles?.mass} />
      <LawPart
        {...shared}
        number={2}
        axis="semiMajorAxis"
        nodes={grid.semiMajorAxisAu}
        profile={profiles?.semiMajorAxis}
      />
      <BuilderPart number={3} title="Orbits" form="with the maps">
        <p className="text-ink2 text-note">{orbits}</p>
      </BuilderPart>
      <HostPart {...shared} number={4} />
      <FractionPart number={5} setting={setting} onSetting={onSetting} />
    </div>
  );
}
