import type { RateQuestion } from './contract';

/**
 * A question without some of its stars: their detections and candidates go with them.
 *
 * @param stars indices; repeated ones count once
 * @throws RangeError for an index, or a detection of a star, that is not there
 */
export function withoutStars(question: RateQuestion, stars: readonly number[]): RateQuestion {
  const count = question.completeness.length;
  const isGone = new Uint8Array(count);
  const check = (star: number) => {
    if (!(star in isGone)) throw new RangeError(`there is no star ${star} among ${count}`);
  };
  for (const star of stars) {
    check(star);
    isGone[star] = 1;
  }
  const place = new Int32Array(count);
  let left = 0;
  for (let star = 0; star < count; star++) place[star] = isGone[star] ? -1 : left++;
  const keep = (values: Float64Array) => values.filter((_, star) => !isGone[star]);
  for (const star of question.detectedStars) check(star);
  const { candidates, rateScale } = question;
  for (const { star } of candidates?.entries ?? []) check(star);
  return {
    ...question,
    completeness: keep(question.completeness),
    detectedStars: question.detectedStars
      .filter((star) => !isGone[star])
      .map((star) => place[star]),
    ...(rateScale && { rateScale: keep(rateScale) }),
    ...(candidates && {
      candidates: {
        ...candidates,
        entries: candidates.entries
          .filter(({ star }) => !isGone[star])
          .map((entry) => ({ ...entry, star: place[entry.star] })),
      },
    }),
  };
}
