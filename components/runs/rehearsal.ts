import type { Steps } from './consequences';
import { liveAnswer } from './live-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';
import { LiveViews } from './live-views';
import { orNull } from './or-null';

const TURNS = 12;
const NUDGE = 1e-6;

/**
 * The work of a drag before there is one, in short steps, so that the browser has compiled it when a
 * hand takes a control: the first frames of a drag would pay for that otherwise.
 */
export function* rehearseDrag(sample: LiveSample, setting: LiveSetting): Steps<void> {
  for (const field of ['massIndex', 'semiMajorAxisIndex', 'semiMajorAxisMaxAu'] as const) {
    const views = new LiveViews(sample);
    for (let turn = 0; turn < TURNS; turn++) {
      const value = setting.definition[field] * (1 + NUDGE * (turn % 2)) + NUDGE * (turn % 2);
      const definition = { ...setting.definition, [field]: value };
      orNull(() => liveAnswer(sample, views.of(definition), { ...setting, definition }));
      yield;
    }
  }
}
