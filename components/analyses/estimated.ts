import type { StarMaps } from '@/components/hooks/use-run-maps';
import { askedOf } from '@/components/runs/live-answer';
import { restrictSample, sampleOf } from '@/components/runs/live-sample';
import type { LiveSetting } from '@/components/runs/live-setting';
import { type Answer, answerFromView, viewPopulation } from '@/lib/inference';
import type { DrawnInputs } from '@/lib/schemas/runs';

/** The answer of the stored maps, or why they give none. */
export interface Estimated {
  answer?: Answer;
  refusal?: string;
}

/**
 * What a setting gives on those stars of a run that the surveys looked at.
 *
 * @param surveys their ids
 */
export function estimateOf(
  inputs: DrawnInputs,
  maps: StarMaps,
  surveys: string[],
  setting: LiveSetting,
): Estimated {
  const wanted = new Set(surveys);
  const sample = restrictSample(sampleOf(inputs, maps), (star) =>
    star.surveys.some((survey) => wanted.has(survey)),
  );
  if (sample.stars.length === 0) return {};
  try {
    const view = viewPopulation(sample.maps, sample.grid, setting.definition);
    return { answer: answerFromView(view, askedOf(sample, setting)) };
  } catch (reason) {
    if (reason instanceof RangeError) return { refusal: reason.message };
    throw reason;
  }
}
