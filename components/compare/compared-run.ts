import { recipeOfRun } from '@/components/runs/run-recipe';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { DrawnRun } from '@/lib/schemas/runs';
import type { SideAddress } from './address';
import { type ComparedRun, withoutDetections } from './differences';

export interface CompareSide {
  address: SideAddress;
  analysis: AnalysisView | null;
  /** The run that was asked for, with its result; null where there is none. */
  run: DrawnRun | null;
  population: ListedPopulation | null;
}

/** A side with everything that is compared; undefined where it has no finished run. */
export function comparedRun(side: CompareSide): Omit<ComparedRun, 'letter'> | undefined {
  const { address, analysis, run, population } = side;
  const recipe = recipeOfRun(run);
  if (!analysis || !run?.inputs || !run.result || !population || !recipe) return undefined;
  const name = `${address.key}${address.run === undefined ? '' : `, run ${address.run}`}`;
  return {
    address,
    name: address.isZero ? `${name} without detections` : name,
    title: analysis.name,
    run,
    inputs: run.inputs,
    result: address.isZero ? withoutDetections(run.result) : run.result,
    recipe: address.isZero ? { ...recipe, detections: 'none' } : recipe,
    definition: population.definition,
  };
}
