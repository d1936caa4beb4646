import type { AnalysisView } from '@/lib/schemas/analyses';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import { isSameDefinition, type LiveSetting } from './live-setting';

/** Whether a setting has ranges or indices of its own, which saving makes a population of. */
export function hasOwnPopulation(
  { population }: Pick<AnalysisView, 'population'>,
  { definition }: Pick<LiveSetting, 'definition'>,
): boolean {
  const before = population.definition;
  return !isPlainPowerLaw(before) || !isSameDefinition(definition, before);
}

/** The shared population that saving a setting would add a version to; undefined: none. */
export function sharedVersion(
  analysis: Pick<AnalysisView, 'population'>,
  setting: Pick<LiveSetting, 'definition'>,
): string | undefined {
  const { key, isShared, can } = analysis.population;
  return isShared && can.saveVersion && hasOwnPopulation(analysis, setting) ? key : undefined;
}
