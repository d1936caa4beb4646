'use client';

import { useMemo } from 'react';
import { JupiterMass } from '@/components/ui/notation';
import { Notice } from '@/components/ui/notice';
import { TextAction } from '@/components/ui/text-action';
import { type Population, populationWarnings } from '@/lib/population';
import { formatLimit, formatPercent } from '@/lib/quantities/display';
import type { PreviewSetting } from './builder-setting';
import { HARDLY_ANY, hardlySeenWords, shareHardlySeen } from './hardly-seen';
import type { LawDefinition } from './law-parts';
import { betterStart, previewAnswer } from './preview-figures';
import type { Spread } from './spread';
import type { Preview } from './use-preview';

interface PreviewWarningsProps {
  preview: Preview;
  population: Population;
  spread: Spread;
  setting: PreviewSetting;
  onDefinition?(definition: LawDefinition): void;
}

/** What a limit under the population would rest on beside the data. */
export function PreviewWarnings(props: PreviewWarningsProps) {
  const { preview, population, spread, setting, onDefinition } = props;
  const { sample, map } = preview;
  const { prior, credibleLevel } = setting;
  const share = shareHardlySeen(spread.map, population, spread.weights);
  const words = hardlySeenWords(share);
  const outside = spread.weights.shareOutsideMap;
  const better = useMemo(() => {
    if (share < HARDLY_ANY || population.form === 'systems') return null;
    const start = betterStart(sample, map, population);
    if (!start) return null;
    const asked = { definition: start.definition, prior, credibleLevel };
    return { ...start, limit: previewAnswer(sample, asked)?.withDetections?.limit };
  }, [share, population, sample, map, prior, credibleLevel]);
  const start = better && (
    <span className="whitespace-nowrap">
      {better.isRatio && (
        <>
          <i>q</i> ={' '}
        </>
      )}
      {better.start}
      {!better.isRatio && (
        <>
          {' '}
          <JupiterMass />
        </>
      )}
    </span>
  );
  return (
    <div className="grid gap-2">
      {populationWarnings(population).map((warning) => (
        <Notice key={warning} tone="warn" title={`${warning[0].toUpperCase()}${warning.slice(1)}.`}>
          Move the break or the range, or choose a power law.
        </Notice>
      ))}
      {outside > 0.0005 && (
        <Notice
          tone="warn"
          title={`${formatPercent(outside)} of this population lies beyond the map grid.`}
        >
          Nothing counts as seen there. A run is refused until its analysis says that this is meant.
        </Notice>
      )}
      {share >= HARDLY_ANY && (
        <Notice
          tone="warn"
          title={`${words.fact}.`}
          actions={
            better &&
            onDefinition && (
              <TextAction onClick={() => onDefinition(better.definition)}>
                <span>Start at {start}</span>
              </TextAction>
            )
          }
        >
          {words.meaning}.
          {better && (
            <>
              {' '}
              From {start} up the share is under 1{'\u2009'}%
              {better.limit !== undefined &&
                ` and, with the same laws, the limit ${formatLimit(better.limit, 'host_fraction')}`}
              .
            </>
          )}
        </Notice>
      )}
    </div>
  );
}
