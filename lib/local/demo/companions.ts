import { inventedMagnitude } from './cooling';
import type { DemoEpoch } from './epochs';
import { drawEpochs } from './epochs';
import { type DemoStar, type DemoSurvey, hostPlaces } from './sky';

/** One source beside a star, as the demonstration's files and screens hold it. */
export interface DemoCompanion {
  star: string;
  name: string;
  status: 'confirmed' | 'candidate' | 'background';
  mass: [value: number, lower: number, upper: number] | null;
  axis: [value: number, lower: number, upper: number] | null;
  probability: number;
  epochs: DemoEpoch[];
}

/** How much fainter than its star a companion of this mass is in the survey's band [mag]. */
function contrastOf(survey: DemoSurvey, star: DemoStar, massMjup: number): number {
  const modulus = 5 * Math.log10(star.distancePc) - 5;
  const absolute = inventedMagnitude(massMjup, star.ageMyr, survey.band);
  return absolute + modulus - star.apparent[survey.band];
}

/** Companions of a survey: the two detections, one candidate inside the ranges, some background. */
export function companionsOf(survey: DemoSurvey, stars: DemoStar[]): DemoCompanion[] {
  const at = (place: { raDeg: number; decDeg: number }) =>
    stars.find((star) => star.raDeg === place.raDeg && star.decDeg === place.decDeg);
  const [first, second] = [at(hostPlaces.first), at(hostPlaces.second)];
  const quiet = stars.filter((star) => star !== first && star !== second);
  const bound = (
    star: DemoStar,
    given: Omit<DemoCompanion, 'star' | 'epochs'>,
    projectedAu: number,
    days: string[],
  ): DemoCompanion => ({
    ...given,
    star: star.name,
    epochs: drawEpochs({
      ...{ survey, star, days },
      isBound: true,
      separationArcsec: projectedAu / star.distancePc,
      contrastMag: contrastOf(survey, star, given.mass?.[0] ?? 5),
    }),
  });
  const behind = (star: DemoStar, days: string[]): DemoCompanion => ({
    ...{ star: star.name, name: 'cc1', status: 'background', mass: null, axis: null },
    probability: 0,
    epochs: drawEpochs({
      ...{ survey, star, days },
      isBound: false,
      separationArcsec: 1.1,
      contrastMag: survey.floorMag - 2.5,
    }),
  });
  const companions: DemoCompanion[] = [];
  if (first && survey.slug === 'halyard') {
    const given = { name: 'b', status: 'confirmed', probability: 1 } as const;
    const days = ['2016-03-11', '2017-04-02', '2019-02-20'];
    companions.push(bound(first, { ...given, mass: [6.4, 0.9, 1.2], axis: [41, 5, 7] }, 36, days));
  }
  if (second) {
    const given = { name: 'b', status: 'confirmed', probability: 1 } as const;
    const days = ['2020-12-05', '2022-01-18'];
    companions.push(
      bound(second, { ...given, mass: [14.6, 1.6, 2.1], axis: [118, 18, 26] }, 101, days),
    );
  }
  if (survey.slug === 'curlew') {
    const given = { name: 'cc1', status: 'candidate', probability: 0.35 } as const;
    // Seven weeks apart: the star has not moved by enough of the errors to tell.
    const days = ['2024-09-14', '2024-11-02'];
    companions.push(
      bound(quiet[20], { ...given, mass: [8.2, 2.2, 2.9], axis: [165, 30, 40] }, 138, days),
    );
  }
  companions.push(behind(quiet[3], [`${survey.from}-05-20`, `${survey.from + 2}-06-11`]));
  if (survey.slug === 'halyard') {
    companions.push(behind(quiet[9], ['2015-11-03', '2017-10-21', '2018-12-12']));
  }
  return companions;
}
