import { askedOf } from '@/components/runs/live-answer';
import type { LiveSample } from '@/components/runs/live-sample';
import { isSameSetting, type LiveSetting, settingOfRecipe } from '@/components/runs/live-setting';
import { orNull } from '@/components/runs/or-null';
import { answerFromView, type PopulationView, viewPopulation } from '@/lib/inference';
import { type OrderStep, stepsOverOrders } from '@/lib/inference/order-steps';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ComparedRun } from './differences';

interface Ends {
  a: { setting: LiveSetting; sample: LiveSample };
  b: { setting: LiveSetting; sample: LiveSample };
}

interface Change {
  name: string;
  apply(to: LiveSetting, from: LiveSetting): LiveSetting;
}

export interface WayFromAToB {
  from: number;
  to: number;
  steps: OrderStep[];
}

const definitionChange = (name: string, fields: (keyof LiveSetting['definition'])[]): Change => ({
  name,
  apply: (setting, target) => ({
    ...setting,
    definition: {
      ...setting.definition,
      ...Object.fromEntries(fields.map((field) => [field, target.definition[field]])),
    },
  }),
});

const fieldChange = (name: string, field: keyof LiveSetting): Change => ({
  name,
  apply: (setting, target) => ({ ...setting, [field]: target[field] }),
});

const changes: Change[] = [
  fieldChange('Detections', 'detections'),
  fieldChange('Candidates', 'candidates'),
  fieldChange('Background', 'background'),
  definitionChange('Planet mass', ['massMinMjup', 'massMaxMjup']),
  definitionChange('Semi-major axis', ['semiMajorAxisMinAu', 'semiMajorAxisMaxAu']),
  definitionChange('Mass index α', ['massIndex']),
  definitionChange('Axis index β', ['semiMajorAxisIndex']),
  fieldChange('Prior', 'prior'),
  fieldChange('Level', 'credibleLevel'),
];
const SAMPLE = 'Stars and maps';

/** The setting of a side, where its law is one that the page can follow. */
export function settingOf({ recipe, definition }: ComparedRun): LiveSetting | undefined {
  return isPlainPowerLaw(definition) ? settingOfRecipe(recipe, definition) : undefined;
}

/** Why there is no way from one to the other; undefined: there is one. */
export function whyNoWay(a: ComparedRun, b: ComparedRun): string | undefined {
  if (a.result.quantity !== b.result.quantity) {
    return 'One is a limit on the fraction of hosts, the other on the mean number of planets: no steps lead from one to the other.';
  }
  if (!settingOf(a) || !settingOf(b)) {
    return 'The steps are computed for plain power laws; one of the two has another law.';
  }
  return undefined;
}

/** Names of what differs, in the order in which the steps are read. */
function changesBetween({ a, b }: Ends): Change[] {
  return changes.filter(({ apply }) => !isSameSetting(apply(a.setting, b.setting), a.setting));
}

/**
 * The way from the limit of A to that of B, one step a difference.
 *
 * It computes the limit for every set of changes (2 to the power of their number), and gives the
 * page its turn between two of them.
 *
 * @returns undefined where the two differ in nothing, or one of the mixtures has no answer
 */
export async function wayFromAToB(
  ends: Ends,
  isSameSample: boolean,
  pause: () => Promise<void>,
): Promise<WayFromAToB | undefined> {
  const differing = changesBetween(ends);
  const names = differing.map(({ name }) => name);
  if (!isSameSample) names.push(SAMPLE);
  if (names.length === 0) return undefined;
  const views = new Map<string, PopulationView>();
  const limits: number[] = [];
  for (let made = 0; made < 2 ** names.length; made += 1) {
    const isSampleOfB = !isSameSample && (made & (1 << differing.length)) > 0;
    const { sample } = isSampleOfB ? ends.b : ends.a;
    const setting = differing.reduce(
      (so, { apply }, index) => (made & (1 << index) ? apply(so, ends.b.setting) : so),
      ends.a.setting,
    );
    limits.push(limitOf(sample, setting, isSampleOfB, views));
    await pause();
  }
  const last = limits[limits.length - 1];
  const steps = stepsOverOrders(names, (made) => limits[made]);
  return steps.every(({ averaged }) => Number.isFinite(averaged))
    ? { from: limits[0], to: last, steps }
    : undefined;
}

function limitOf(
  sample: LiveSample,
  setting: LiveSetting,
  isSampleOfB: boolean,
  views: Map<string, PopulationView>,
): number {
  const answer = orNull(() => {
    const key = `${isSampleOfB} ${JSON.stringify(setting.definition)}`;
    const view = views.get(key) ?? viewPopulation(sample.maps, sample.grid, setting.definition);
    views.set(key, view);
    return answerFromView(view, askedOf(sample, setting));
  });
  return answer?.limit ?? Number.NaN;
}
