'use client';

import { useMemo } from 'react';
import useSWR from 'swr';
import type { MapData } from '@/components/charts/map-contours';
import { answer } from '@/components/hooks/answer';
import { apiPath, withQuery } from '@/components/hooks/api-path';
import { sentenceOf } from '@/components/hooks/api-problem';
import { request } from '@/components/hooks/request';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import { type LiveSample, sampleOf } from '@/components/runs/live-sample';
import type { DrawnRun } from '@/lib/schemas/runs';

export interface Preview {
  sample: LiveSample;
  /** Mean completeness over all stars. */
  map: MapData;
  /** "A-31, run 18, 94 stars": whose maps these are. */
  source: string;
}

export interface PreviewState {
  preview: Preview | undefined;
  /** While there is none: why. */
  reason: string;
  /** Whether the masses of the stars are still on their way. */
  isFetchingMasses: boolean;
}

/** Maps of a run, with the masses of its stars where the population asks for them. */
export function usePreview(
  collaboration: string,
  run: DrawnRun | null,
  needsMasses: boolean,
): PreviewState {
  const { data: maps, error } = useRunMaps(collaboration, run ?? undefined);
  const { masses, fault, isFetching } = useHostMasses(collaboration, run, needsMasses);
  const plain = useMemo<Preview | undefined>(() => {
    if (!maps || !run?.inputs || !run.result) return undefined;
    return {
      sample: sampleOf(run.inputs, maps),
      map: {
        massMjup: maps.massMjup,
        semiMajorAxisAu: maps.semiMajorAxisAu,
        completeness: Float64Array.from(run.result.meanMap.completeness.flat()),
      },
      source: `${run.analysis.key}, run ${run.number}, ${run.result.stars} stars`,
    };
  }, [maps, run]);
  const preview = useMemo<Preview | undefined>(() => {
    if (!plain || !masses) return plain;
    const stars = plain.sample.stars.map((star) => {
      const hostMassMsun = star.hostMassMsun ?? masses.get(star.starId);
      return hostMassMsun === undefined ? star : { ...star, hostMassMsun };
    });
    return { ...plain, sample: { ...plain.sample, stars } };
  }, [plain, masses]);
  const problem = error ?? fault;
  const reason =
    problem !== undefined
      ? sentenceOf(problem)
      : run === null
        ? 'No run has finished in this collaboration, so nothing says which of these planets would be seen. The first finished run brings its maps here.'
        : `Fetching the maps of ${run.analysis.key}, run ${run.number}.`;
  return { preview, reason, isFetchingMasses: isFetching };
}

/** Masses by star, from the first of the run's surveys that gives one, as a run takes them. */
function useHostMasses(collaboration: string, run: DrawnRun | null, isNeeded: boolean) {
  const inputs = run?.inputs;
  const isKnown = inputs?.stars.every(({ hostMassMsun }) => hostMassMsun !== undefined) ?? false;
  const asks = isNeeded && inputs !== undefined && inputs !== null && !isKnown;
  const { data, error } = useSWR(
    asks ? ['host masses', collaboration, ...inputs.surveys.map(({ slug }) => slug)] : null,
    async ([, , ...slugs]) => {
      const masses = new Map<string, number>();
      for (const slug of slugs) {
        const path = apiPath(collaboration, 'surveys', slug, 'targets');
        for (let offset = 0, total = 1; offset < total; ) {
          const page = await request(
            withQuery(path, { limit: 500, offset }),
            answer('targetListSchema'),
          );
          for (const { starId, hostMassMsun } of page.targets) {
            if (hostMassMsun !== null && !masses.has(starId)) masses.set(starId, hostMassMsun);
          }
          if (page.targets.length === 0) break;
          offset += page.targets.length;
          total = page.total;
        }
      }
      return masses;
    },
    { revalidateOnFocus: false, revalidateIfStale: false },
  );
  return {
    masses: data,
    fault: error as unknown,
    isFetching: asks && !data && error === undefined,
  };
}
