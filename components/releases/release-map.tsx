'use client';

import { useMemo } from 'react';
import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { RampKey } from '@/components/charts/ramp-key';
import { asMark } from '@/components/runs/sensitivity-section';
import type { ShownRun } from '@/lib/schemas/release-page';

/** Mean completeness of the stars, with the range, the companions that count and those that do not. */
export function ReleaseMap({ run }: { run: ShownRun }) {
  const { meanMap, stars, counted } = run.result;
  const map = useMemo(
    () => ({
      massMjup: Float64Array.from(meanMap.massMjup),
      semiMajorAxisAu: Float64Array.from(meanMap.semiMajorAxisAu),
      completeness: Float64Array.from(meanMap.completeness.flat()),
    }),
    [meanMap],
  );
  const marks = useMemo(() => {
    const names = new Set(counted.map(({ name }) => name));
    return run.companions.map((one) => ({ ...asMark(one), isAside: !names.has(one.name) }));
  }, [run.companions, counted]);
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
        detections={marks}
        height={340}
      />
      <RampKey label="detection probability, %" />
      {marks.some(({ isAside }) => isAside) && (
        <p className="mt-1 text-chart text-ink3">
          Open rings: companions that do not count, set aside or outside the ranges.
        </p>
      )}
    </>
  );
}
