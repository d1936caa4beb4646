import { describeLimit, type StatementInputs } from '@/lib/inference';
import { isInside, type Population } from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { DetectionView, RunInputs, RunResult } from '@/lib/schemas/runs';
import type { MapGrid } from '@/lib/sensitivity';
import type { AnswerRunOutput } from '../compute/answer-run';
import type { RunCandidates } from './run-candidates';
import type { MapStack } from './run-stack';

export interface CountedCompanions {
  counted: DetectionView[];
  outside: DetectionView[];
  mergedNames: string[];
  /** One star index per counted companion. */
  detectedStars: number[];
}

/** Which confirmed companions the likelihood counts. */
export function countCompanions(
  confirmed: DetectionView[],
  inputs: RunInputs,
  population: Population,
  recipe: AnalysisRecipe,
): CountedCompanions {
  const hostOf = new Map(inputs.stars.map(({ starId, hostMassMsun }) => [starId, hostMassMsun]));
  const inside = confirmed.filter(({ massMjup, semiMajorAxisAu, starId }) =>
    isInside(population, massMjup, semiMajorAxisAu, hostOf.get(starId)),
  );
  const outside = confirmed.filter((companion) => !inside.includes(companion));
  const counted = recipe.detections === 'none' ? [] : inside;
  const isSecond = ({ starId }: DetectionView, index: number) =>
    counted.findIndex((other) => other.starId === starId) < index;
  return {
    counted,
    outside,
    mergedNames:
      recipe.likelihood === 'host-fraction' ? counted.filter(isSecond).map(({ name }) => name) : [],
    detectedStars: counted.map(({ starId }) =>
      inputs.stars.findIndex((star) => star.starId === starId),
    ),
  };
}

interface Parts {
  inputs: RunInputs;
  recipe: AnalysisRecipe;
  population: Population;
  stack: Pick<MapStack, 'shareOutsideMaps' | 'shareFlaggedCooling'>;
  counted: CountedCompanions;
  candidates: RunCandidates;
  /** Conditions that a reader is warned by. */
  warnings: string[];
  output: AnswerRunOutput;
  grid: MapGrid;
}

/** The result as it is stored: every number with what it needs to be read. */
export function assembleResult(parts: Parts): RunResult {
  const { inputs, recipe, stack, counted, candidates, output, grid } = parts;
  const { counted: detections, outside, mergedNames } = counted;
  return {
    quantity: quantityOf(recipe),
    credibleLevel: recipe.credibleLevel,
    stars: inputs.stars.length,
    entries: inputs.surveys.reduce((sum, { entries }) => sum + entries, 0),
    exposure: output.exposure,
    answer: output.answer,
    zero: output.zero,
    atTenthOfFloor: output.atTenthOfFloor,
    counted: detections,
    outside,
    mergedNames,
    levels: output.levels,
    beside: output.beside,
    candidates: candidates.kept,
    background: recipe.background ?? null,
    shareOutsideMaps: stack.shareOutsideMaps,
    shareFlaggedCooling: stack.shareFlaggedCooling,
    meanMap: {
      massMjup: [...grid.massMjup],
      semiMajorAxisAu: [...grid.semiMajorAxisAu],
      completeness: output.meanMap,
    },
    depth: {
      semiMajorAxisAu: [...grid.semiMajorAxisAu],
      surveys: inputs.surveys.map(({ id }, i) => ({ id, stars: output.depth[i] })),
    },
    starTable: tabulateStars(parts),
    priorCutAt: output.cutAt,
    statement: stateResult(parts),
  };
}

const quantityOf = ({ likelihood }: AnalysisRecipe) =>
  likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star';

function tabulateStars({ inputs, counted, output }: Parts): RunResult['starTable'] {
  return inputs.stars
    .map(({ starId, name, surveys }, i) => ({
      starId,
      name,
      surveys,
      probability: output.completenessPerStar[i],
      hosts: counted.counted.filter((found) => found.starId === starId).map((found) => found.name),
    }))
    .sort((a, b) => b.probability - a.probability);
}

function stateResult(parts: Parts) {
  const { inputs, recipe, population, stack, counted, candidates, output } = parts;
  const { answer } = output;
  const likelihoodCount =
    recipe.likelihood === 'host-fraction'
      ? new Set(counted.detectedStars).size
      : counted.detectedStars.length;
  const stated: StatementInputs = {
    quantity: quantityOf(recipe),
    limit: answer.limit,
    credibleLevel: recipe.credibleLevel,
    population,
    prior: recipe.prior,
    detections: likelihoodCount,
    stars: inputs.stars.length,
    exposure: output.exposure,
    combinationRule: inputs.combination,
    cooling: inputs.cooling,
    eccentricity: inputs.eccentricity,
    threshold: inputs.threshold,
    shareOutside: Math.max(stack.shareOutsideMaps, 0),
    constrained: answer.isConstrained,
    setByPrior: answer.isSetByPrior,
    cutAt: output.cutAt,
    ...(candidates.stated && { candidates: candidates.stated }),
    background: recipe.background ?? null,
    ...(likelihoodCount + candidates.counted.length > 0 && {
      interval: {
        kind: 'equal-tailed' as const,
        low: answer.interval68[0],
        high: answer.interval68[1],
        level: 0.68,
      },
    }),
  };
  const { sentence, conditions } = describeLimit(stated);
  return { sentence, conditions: [...conditions, ...extraConditions(parts)] };
}

/** What the likelihood's own conditions do not say. */
function extraConditions({ inputs, stack, counted, output, warnings }: Parts): string[] {
  const { shareFlaggedCooling } = stack;
  const { outside, mergedNames } = counted;
  const conditions = [...warnings];
  if (inputs.storedCombination) {
    const { key, version, name, words } = inputs.storedCombination;
    conditions.push(`Combination: ${key} version ${version}, ${name}: ${words}`);
  }
  if (inputs.sample) {
    const { key, version, name, words } = inputs.sample;
    conditions.push(`Sample: ${key} version ${version}, ${name}: ${words}`);
  }
  if (output.missingColumn !== null) conditions.push(`Table of limits: ${output.missingColumn}`);
  if (shareFlaggedCooling > 0) {
    const share = (100 * shareFlaggedCooling).toPrecision(2);
    conditions.push(
      `Cooling limits: ${Number(share)} % of this population at masses beyond the cooling relation's validity`,
    );
  }
  if (outside.length > 0) {
    conditions.push(`Outside the ranges: ${outside.map(({ name }) => name).join(', ')}`);
  }
  if (mergedNames.length > 0) {
    conditions.push(`Counted with another of the same star: ${mergedNames.join(', ')}`);
  }
  for (const { quantity, table, stars } of inputs.adopted ?? []) {
    conditions.push(
      `${quantity === 'age' ? 'Ages' : 'Distances'}: ${quantity}s table ${table}, which adopts one for ${stars} of these stars; else as each survey says`,
    );
  }
  for (const { survey, owner, attribution, version, scope } of inputs.shared ?? []) {
    const what = scope === 'maps' ? 'its maps only, ' : '';
    conditions.push(
      `Shared: ${survey} by ${owner}, ${what}version ${version.slice(0, 8)}: ${attribution}`,
    );
  }
  if (inputs.leftOut.length > 0) {
    conditions.push(`Left out: ${inputs.leftOut.length} entries, each with a reason`);
  }
  return conditions;
}
