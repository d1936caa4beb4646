'use client';

import { useState } from 'react';
import { reachesBeyond } from '@/components/analyses/population-choice';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { TextAction } from '@/components/ui/text-action';
import { describePopulation, describePrior } from '@/lib/inference';
import { formatRange } from '@/lib/quantities/display';
import type { MapGrid } from '@/lib/sensitivity';
import type { BuilderSetting } from './builder-setting';
import { AxisRange, MassRange, PowerLaw } from './law-notation';

/** The population as a sentence, and what has been checked of it. */
export function InWords({
  setting,
  grid,
  hasMaps,
}: {
  setting: BuilderSetting;
  grid: MapGrid;
  hasMaps: boolean;
}) {
  const { definition, convention, prior } = setting;
  const [isCopied, setCopied] = useState(false);
  const isBeyond = reachesBeyond(definition, grid);
  const ends = (nodes: Float64Array, unit: string) =>
    formatRange(nodes[0], nodes[nodes.length - 1], unit);
  return (
    <section className="mt-7">
      <SectionOpener title="In words" />
      <p className="text-body leading-normal">
        Planet masses follow <PowerLaw variable="mass" {...{ definition, convention }} /> over{' '}
        <MassRange definition={definition} />, semi-major axes{' '}
        <PowerLaw variable="semi-major axis" {...{ definition, convention }} /> over{' '}
        <AxisRange definition={definition} />. The preview's prior is{' '}
        {describePrior(prior, 'host_fraction')}.
      </p>
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
      <div className="mt-3 grid gap-1">
        <StateMark kind="ok">integrates to 1 over both ranges</StateMark>
        {hasMaps && (
          <StateMark kind={isBeyond ? 'warn' : 'ok'}>
            {isBeyond ? 'reaches beyond' : 'inside'} the map grid, {ends(grid.massMjup, 'MJ')} and{' '}
            {ends(grid.semiMajorAxisAu, 'AU')}
          </StateMark>
        )}
      </div>
    </section>
  );
}
