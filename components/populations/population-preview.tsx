'use client';

import { useMemo } from 'react';
import { orNull } from '@/components/runs/or-null';
import { Notice } from '@/components/ui/notice';
import { hostScalingOf, type Population } from '@/lib/population';
import type { PreviewSetting } from './builder-setting';
import { drawSeen } from './draw-seen';
import type { LawDefinition } from './law-parts';
import { marginsOf } from './margins';
import { MissingMasses, missingMasses } from './missing-masses';
import { PreviewFacts } from './preview-facts';
import { faultOnSample, previewAnswer } from './preview-figures';
import { PreviewScatter } from './preview-scatter';
import { PreviewWarnings } from './preview-warnings';
import { spreadOf } from './spread';
import type { Preview } from './use-preview';

interface PopulationPreviewProps {
  population: Population;
  setting: PreviewSetting;
  /** The setting when nothing was being dragged last. */
  settled: PreviewSetting;
  preview: Preview;
  isFetchingMasses: boolean;
  /** Missing where nothing can be changed. */
  onDefinition?(definition: LawDefinition, isSettled: boolean): void;
}

/** What the surveys would see of a population of any form, and what it would mean for the limit. */
export function PopulationPreview(props: PopulationPreviewProps) {
  const { population, setting, settled, preview, isFetchingMasses, onDefinition } = props;
  const { sample, map, source } = preview;
  const { prior, credibleLevel } = setting;
  const spread = useMemo(
    () => orNull(() => spreadOf(sample, map, population)),
    [sample, map, population],
  );
  const planets = useMemo(
    () => orNull(() => drawSeen(population, spread?.map, spread ? { sample, spread } : undefined)),
    [population, sample, spread],
  );
  const margins = useMemo(
    () => spread && orNull(() => marginsOf(sample, population, spread)),
    [sample, population, spread],
  );
  const answer = useMemo(
    () => previewAnswer(sample, { definition: population, prior, credibleLevel }),
    [sample, population, prior, credibleLevel],
  );
  const stars = sample.stars.length;
  const missing = missingMasses(sample, population);
  const isScaled = hostScalingOf(population) !== null;
  const subject = `mean completeness of ${stars - missing.length} stars${isScaled ? ', each by its rate' : ''}`;

  if (isFetchingMasses) {
    return (
      <p className="text-ink2 text-note" role="status">
        Fetching the masses of the stars.
      </p>
    );
  }
  return (
    <div className="min-w-0">
      {spread && planets && (
        <PreviewScatter
          {...{ population, planets, spread, margins, subject, source }}
          onRange={
            population.form === 'power-law' || population.form === 'shaped'
              ? onDefinition &&
                ((range, isSettled) => onDefinition({ ...population, ...range }, isSettled))
              : undefined
          }
        />
      )}
      <div className="mt-5 grid gap-2">
        <MissingMasses population={population} sample={sample} missing={missing} />
        {answer ? (
          <div>
            <PreviewFacts {...{ answer, population, setting, stars }} />
          </div>
        ) : (
          missing.length === 0 && (
            <Notice tone="bad" title="No limit under this population.">
              {sentence(faultOnSample(sample, population) ?? 'it has no answer')}
            </Notice>
          )
        )}
        {spread && (
          <PreviewWarnings
            preview={preview}
            population={population}
            spread={spread}
            setting={settled}
            onDefinition={onDefinition && ((next) => onDefinition(next, true))}
          />
        )}
      </div>
    </div>
  );
}

const sentence = (fault: string) => `${fault[0].toUpperCase()}${fault.slice(1)}.`;
