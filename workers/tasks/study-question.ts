import type { MeasuredDetection } from '@/lib/inference/measured-places';
import type { Population } from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { DetectionView, RunInputs } from '@/lib/schemas/runs';
import type { MapGrid } from '@/lib/sensitivity';
import type { RunQuestion } from '../answers/run-question';
import { openCandidatesOf } from './run-candidates';

export type { RunQuestion } from '../answers/run-question';

interface Parts {
  maps: Uint16Array;
  grid: MapGrid;
  population: Population;
  recipe: AnalysisRecipe;
  inputs: RunInputs;
}

function measured(value: number, errors: [number, number] | null) {
  if (errors === null || (errors[0] === 0 && errors[1] === 0)) return { value };
  const [lower, upper] = errors;
  // A log-normal law has no room for an error as large as the value itself.
  return { value, lower: lower < value ? value - lower : undefined, upper: value + upper };
}

function asDetection(found: DetectionView, star: number): MeasuredDetection {
  const { name, massMjup, semiMajorAxisAu } = found;
  return {
    name,
    star,
    massMjup,
    semiMajorAxisAu,
    measurement: {
      kind: 'values',
      mass: measured(massMjup, found.massErrorsMjup),
      semiMajorAxis: measured(semiMajorAxisAu, found.semiMajorAxisErrorsAu),
    },
  };
}

/** The question of a run as its stored inputs and its own copy of the recipe state it. */
export function questionOf(parts: Parts): RunQuestion {
  const { maps, grid, population, recipe, inputs } = parts;
  const isAllSetAside = recipe.detections === 'none';
  const confirmed = isAllSetAside ? [] : inputs.companions;
  const starOf = new Map(inputs.stars.map(({ starId }, i) => [starId, i]));
  return {
    maps,
    grid,
    population,
    hostMassMsun: Float64Array.from(inputs.stars, ({ hostMassMsun }) => hostMassMsun ?? Number.NaN),
    likelihood: recipe.likelihood,
    prior: recipe.prior,
    level: recipe.credibleLevel,
    detections: confirmed.flatMap((found) => {
      const star = starOf.get(found.starId);
      return star === undefined ? [] : asDetection(found, star);
    }),
    candidates:
      recipe.candidates && !isAllSetAside
        ? { ...recipe.candidates, open: openCandidatesOf(inputs) }
        : null,
    background: recipe.background ?? null,
  };
}
