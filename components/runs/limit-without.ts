import { answerFromView, type PopulationView } from '@/lib/inference';
import { askedOf } from './live-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';
import { orNull } from './or-null';

export interface WithoutStars {
  stars: number;
  /** Counted detections that went with their stars. */
  detections: string[];
  limit: number;
}

/**
 * The limit of the sample without some of its stars and without their detections.
 *
 * @returns undefined where none of the stars is known, or what is left has no answer
 */
export function limitWithout(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  names: ReadonlySet<string>,
): WithoutStars | undefined {
  const { completenessPerStar } = view;
  if (!completenessPerStar) return undefined;
  const placeOf = new Map<number, number>();
  sample.stars.forEach((star, index) => {
    if (!names.has(star.name)) placeOf.set(index, placeOf.size);
  });
  const left = sample.stars.length - placeOf.size;
  if (left === 0 || placeOf.size === 0) return undefined;
  const kept = completenessPerStar.filter((_, star) => placeOf.has(star));
  const moved = <Item extends { star: number }>(items: readonly Item[]): Item[] =>
    items.flatMap((item) => {
      const star = placeOf.get(item.star);
      return star === undefined ? [] : [{ ...item, star }];
    });
  const asked = askedOf(sample, setting);
  const rest: PopulationView = {
    ...view,
    completenessPerStar: kept,
    exposure: kept.reduce((sum, one) => sum + one, 0),
    stars: placeOf.size,
  };
  const candidates = asked.candidates && {
    ...asked.candidates,
    open: moved(asked.candidates.open),
  };
  const all = orNull(() => answerFromView(view, asked).counted.map(({ name }) => name)) ?? [];
  const answer = orNull(() =>
    answerFromView(rest, { ...asked, candidates, detections: moved(asked.detections) }),
  );
  if (answer === null) return undefined;
  const counted = new Set(answer.counted.map(({ name }) => name));
  return {
    stars: left,
    detections: all.filter((name) => !counted.has(name)),
    limit: answer.limit,
  };
}

/** "these 66 stars and their one detection": what was left out, in words. */
export function withoutWords(
  { stars, detections }: Pick<WithoutStars, 'stars' | 'detections'>,
  name?: string,
): string {
  const what = name ?? (stars === 1 ? 'this star' : `these ${stars} stars`);
  if (detections.length === 0) return what;
  const count = detections.length === 1 ? 'one detection' : `${detections.length} detections`;
  return `${what} and ${stars === 1 ? 'its' : 'their'} ${count}`;
}
