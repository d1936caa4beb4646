'use client';

import { useState } from 'react';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { TextAction } from '@/components/ui/text-action';
import { describePopulation, describePrior } from '@/lib/inference';
import { formatRange } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { MapGrid } from '@/lib/sensitivity';
import type { BuilderSetting } from './builder-setting';
import { type LawDefinition, partsOf } from './law-parts';
import { reachesBeyond } from './reaches-beyond';
import { RangeWords, ScalingWords, ShapeWords } from './shape-words';

interface InWordsProps {
  setting: BuilderSetting;
  /** Why the population cannot be used, or null. */
  fault: string | null;
  grid: MapGrid;
  hasMaps: boolean;
}

/** The population as a sentence, and what has been checked of it. */
export function InWords({ setting, fault, grid, hasMaps }: InWordsProps) {
  const { definition, conventions, prior } = setting;
  const parts = partsOf(definition);
  const law = (axis: 'mass' | 'semiMajorAxis') => (
    <ShapeWords
      axis={axis}
      isRatio={axis === 'mass' && parts.isRatio}
      shape={parts[axis].shape}
      convention={conventions[axis]}
    />
  );
  return (
    <section className="mt-7">
      <SectionOpener title="In words" />
      <p className="text-body leading-normal">
        {parts.isRatio ? 'Ratios of planet to star mass' : 'Planet masses'}
        {followWords(parts.mass.shape.shape)}
        {law('mass')}
        {overWords(parts.mass.shape.shape)} <RangeWords axis="mass" parts={parts} />, semi-major
        axes
        {followWords(parts.semiMajorAxis.shape.shape)}
        {law('semiMajorAxis')}
        {overWords(parts.semiMajorAxis.shape.shape)}{' '}
        <RangeWords axis="semiMajorAxis" parts={parts} />
        {parts.hostScaling ? (
          <>
            , <ScalingWords {...parts.hostScaling} />
          </>
        ) : (
          ', with the same rate around every star'
        )}
        . The preview's prior is {describePrior(prior, 'host_fraction')}.
      </p>
      <CopyWords definition={definition} />
      <div className="mt-3 grid gap-1">
        {fault === null ? (
          <StateMark kind="ok">integrates to 1 over both ranges</StateMark>
        ) : (
          <StateMark kind="bad">{fault}</StateMark>
        )}
        {hasMaps && <OnGrid definition={definition} grid={grid} />}
      </div>
    </section>
  );
}

/** Before the range; what has clauses of its own is closed by a comma. */
function overWords(shape: string): string {
  return shape === 'power-law' ? ' over' : ', over';
}

function followWords(shape: string): string {
  return shape === 'power-law' || shape === 'broken-power-law' ? ' follow ' : ': ';
}

/** The words that tables, figures and exports use, for the clipboard. */
export function CopyWords({ definition }: { definition: LawDefinition | ListedDefinition }) {
  const [isCopied, setCopied] = useState(false);
  return (
    <TextAction
      icon="copy"
      className="mt-2 font-semibold"
      onClick={async () => {
        await navigator.clipboard.writeText(describePopulation(definition));
        setCopied(true);
      }}
    >
      <span aria-live="polite">{isCopied ? 'Copied' : 'Copy as text'}</span>
    </TextAction>
  );
}

/** Whether the ranges lie inside the maps; those of a mass ratio differ from star to star. */
export function OnGrid({ definition, grid }: { definition: ListedDefinition; grid: MapGrid }) {
  const ends = (nodes: Float64Array, unit: string) =>
    formatRange(nodes[0], nodes[nodes.length - 1], unit);
  if (definition.form === 'mass-ratio') {
    return (
      <StateMark kind="waiting">
        masses follow each star; the map grid is {ends(grid.massMjup, 'MJ')} and{' '}
        {ends(grid.semiMajorAxisAu, 'AU')}
      </StateMark>
    );
  }
  const isBeyond = reachesBeyond(definition, grid);
  return (
    <StateMark kind={isBeyond ? 'warn' : 'ok'}>
      {isBeyond ? 'reaches beyond' : 'inside'} the map grid, {ends(grid.massMjup, 'MJ')} and{' '}
      {ends(grid.semiMajorAxisAu, 'AU')}
    </StateMark>
  );
}
