'use client';

import { useMemo } from 'react';
import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { RampKey } from '@/components/charts/ramp-key';
import { asMark } from '@/components/runs/sensitivity-section';
import type { ShownRun } from '@/lib/schemas/release-page';

/** Mean completeness of the stars, with the range and the companions that were known. */
export function ReleaseMap({ run }: { run: ShownRun }) {
  const { meanMap, stars } = run.result;
  const map = useMemo(
    () => ({
      massMjup: Float64Array.from(meanMap.massMjup),
      semiMajorAxisAu: Float64Array.from(meanMap.semiMajorAxisAu),
      completeness: Float64Array.from(meanMap.completeness.flat()),
    }),
    [meanMap],
  );
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = run.range;
  const isBox =
    massMinMjup !== null &&
    massMaxMjup !== null &&
    semiMajorAxisMinAu !== null &&
    semiMajorAxisMaxAu !== null;
  return (
    <>
      <CompletenessMapChart
        map={map}
        subject={`mean detection probability, ${stars} stars`}
        range={
          isBox ? { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } : undefined
        }
        detections={run.companions.map(asMark)}
        height={340}
      />
      <RampKey label="detection probability, %" />
    </>
  );
}
