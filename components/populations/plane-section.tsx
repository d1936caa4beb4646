'use client';

import { useMemo } from 'react';
import { IndexPlane } from '@/components/charts/index-plane';
import { countOf } from '@/components/runs/level-table';
import type { LiveSample } from '@/components/runs/live-sample';
import { TRACK, trackOf } from '@/components/runs/tracks';
import { useLiveTask } from '@/components/runs/use-live-task';
import { SectionOpener } from '@/components/ui/section-opener';
import { describeLevel, describePrior } from '@/lib/inference';
import { fromLogIndex } from '@/lib/population';
import type { BuilderSetting } from './builder-setting';
import { formatIndex } from './law-notation';
import { definitionOf, type LawAxis, partsOf, withParameter } from './law-parts';
import { previewAnswer } from './preview-figures';

interface PlaneSectionProps {
  sample: LiveSample;
  /** The setting when nothing was being dragged last: the plane follows it. */
  settled: BuilderSetting;
  here: BuilderSetting;
}

/** The limit over both indices, for a population with a power law along each axis. */
export function PlaneSection({ sample, settled, here }: PlaneSectionProps) {
  const { prior, credibleLevel } = settled;
  const parts = partsOf(here.definition);
  const linear = (axis: LawAxis) => {
    const { shape } = parts[axis];
    return shape.shape === 'power-law' ? fromLogIndex(shape.index, 'linear') : Number.NaN;
  };
  const alpha = linear('mass');
  const beta = linear('semiMajorAxis');
  // The plane does not depend on where in it the present indices lie, only on whether they do.
  const [massFrom, massTo] = trackOf(TRACK.massIndex, alpha);
  const [axisFrom, axisTo] = trackOf(TRACK.semiMajorAxisIndex, beta);
  const still = (['mass', 'semiMajorAxis'] as const).reduce(
    (changed, part) => withParameter(changed, { part, field: 'index' }, 0),
    partsOf(settled.definition),
  );
  const { answer: plane, fault } = useLiveTask(
    sample,
    'limitPlane',
    { definition: definitionOf(still), prior, credibleLevel },
    { massIndex: [massFrom, massTo], semiMajorAxisIndex: [axisFrom, axisTo] },
  );
  const present = useMemo(
    () => previewAnswer(sample, here)?.withDetections ?? null,
    [sample, here],
  );
  const level = describeLevel(credibleLevel);
  return (
    <section className="mt-7">
      <SectionOpener
        title={`${level} limit over both indices`}
        help="index-convention"
        context={`${countOf(present?.counted.length ?? 0)}; ${describePrior(prior, 'host_fraction')}; linear indices`}
      />
      {plane && present ? (
        <IndexPlane
          {...plane}
          here={{
            massIndex: Number(alpha.toFixed(6)),
            semiMajorAxisIndex: Number(beta.toFixed(6)),
            limit: present.limit,
          }}
          quantity="host_fraction"
          levelLabel={level}
        />
      ) : plane === undefined && present ? (
        <p className="text-ink2 text-note" role="status">
          {fault === undefined ? 'Computing the limit over both indices.' : `No plane: ${fault}.`}
        </p>
      ) : (
        <p className="text-ink2 text-note">
          No limit at <i>α</i> = {formatIndex(alpha)}, <i>β</i> = {formatIndex(beta)}: nothing of
          this population can be seen, or a detection lies where its star's map sees nothing.
        </p>
      )}
    </section>
  );
}
