'use client';

import { useMemo } from 'react';
import type { DepthSeries } from '@/components/charts/depth-chart';
import type { MapData } from '@/components/charts/map-contours';
import { useCalm } from '@/components/hooks/use-calm';
import { useLoaded } from '@/components/hooks/use-loaded';
import { populationWeights } from '@/lib/population';
import type { DrawnInputs, DrawnResult } from '@/lib/schemas/runs';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';
import { orNull } from './or-null';
import { depthOf, meanOfSums, profileAlong, sumBySurvey } from './survey-sums';
import { isAsRun } from './under';

/** The mean map and the depth by survey, as a run stored them. */
export function useStoredMap(result: DrawnResult, inputs: DrawnInputs) {
  const map: MapData = useMemo(
    () => ({
      massMjup: Float64Array.from(result.meanMap.massMjup),
      semiMajorAxisAu: Float64Array.from(result.meanMap.semiMajorAxisAu),
      completeness: Float64Array.from(result.meanMap.completeness.flat()),
    }),
    [result],
  );
  const depth = useMemo(() => savedDepth(result, inputs), [result, inputs]);
  return { map, depth };
}

/** How often maps between two stored ages follow a hand. */
const PACE = { paceMs: 300 };

/**
 * The mean map of a run, and what follows from it for a population: depth and profiles; all of them
 * under the setting's ages and cooling model, at a pace of their own.
 */
export function useMapFigures(
  result: DrawnResult,
  inputs: DrawnInputs,
  sample: LiveSample | undefined,
  setting: LiveSetting,
) {
  const stored = useStoredMap(result, inputs);
  const { definition, ageShift, cooling } = setting;
  const under = useCalm(
    useMemo(() => ({ ageShift, cooling }), [ageShift, cooling]),
    PACE,
  );
  const engine = useLoaded('live engine', () => import('./live-engine'));
  const moved = useMemo(
    () => (isAsRun(under) ? sample : sample && orNull(() => engine?.sampleUnder(sample, under))),
    [sample, under, engine],
  );
  const sums = useMemo(() => moved && sumBySurvey(moved, inputs.surveys), [moved, inputs]);
  const map = useMemo(
    () =>
      sums && !isAsRun(under)
        ? { ...stored.map, completeness: meanOfSums(sums, inputs.stars.length) }
        : stored.map,
    [sums, under, stored.map, inputs],
  );
  const weights = useMemo(
    () => orNull(() => populationWeights(map, definition)),
    [map, definition],
  );
  const depth = useMemo(
    () => (sums && weights ? depthOf(sums, weights) : stored.depth),
    [sums, weights, stored.depth],
  );
  const profiles = useMemo(
    () =>
      weights
        ? {
            mass: profileAlong(map.completeness, weights, 'mass'),
            semiMajorAxis: profileAlong(map.completeness, weights, 'semiMajorAxis'),
          }
        : undefined,
    [map, weights],
  );
  return { grid: map, map, depth, profiles };
}

/** Until the maps are there: the depth that the run itself stored. */
function savedDepth(result: DrawnResult, inputs: DrawnInputs): DepthSeries[] {
  return result.depth.surveys.flatMap(({ id, stars }) => {
    const survey = inputs.surveys.find((one) => one.id === id);
    return survey
      ? [{ name: survey.name, seriesIndex: survey.position, depth: Float64Array.from(stars) }]
      : [];
  });
}
