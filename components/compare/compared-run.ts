import { recipeOfRun } from '@/components/runs/run-recipe';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { type PackedRun, unpackRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { SideAddress } from './address';
import { type ComparedRun, withoutDetections } from './differences';

export interface CompareSide {
  address: SideAddress;
  analysis: AnalysisView | null;
  /** The run that was asked for, with its result; null where there is none. */
  run: PackedRun | null;
  population: ListedPopulation | null;
}

/** A side with everything that is compared; undefined where it has no finished run. */
export function comparedRun(side: CompareSide): Omit<ComparedRun, 'letter'> | undefined {
  const { address, analysis, population } = side;
  const run = side.run && unpackRun(side.run);
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
