import { describePrior } from '@/lib/inference';
import { formatPlain } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { Overview } from '@/lib/schemas/overview';
import type { RunInputs } from '@/lib/schemas/runs';

/** A finished run, as far as its place in the history of a limit goes. */
export interface HistoryRun {
  at: Date;
  run: number;
  recipe: AnalysisRecipe;
  limit: number;
  zeroLimit: number;
  stars: number;
  detections: number;
  population: RunInputs['population'];
  cooling: string;
  engineVersion: string;
  inputsDigest: string;
}

const quantityOf = ({ likelihood }: AnalysisRecipe) =>
  likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star';

const counted = (count: number, one: string, many: string) =>
  `${count > 0 ? '+' : '−'}${Math.abs(count)} ${Math.abs(count) === 1 ? one : many}`;

/** What changed between two runs, in few words. */
function changesBetween(before: HistoryRun, after: HistoryRun): string[] {
  const { recipe: was } = before;
  const { recipe: is } = after;
  const changes: string[] = [];
  const note = (hasChanged: boolean, words: string) => {
    if (hasChanged) changes.push(words);
  };
  const { key, version } = after.population;
  note(
    before.population.digest !== after.population.digest,
    `population ${key}, version ${version}`,
  );
  note(before.stars !== after.stars, counted(after.stars - before.stars, 'star', 'stars'));
  note(was.likelihood !== is.likelihood, is.likelihood.replace('-', ' '));
  const prior = describePrior(is.prior, quantityOf(is));
  note(prior !== describePrior(was.prior, quantityOf(was)), `prior ${is.prior.law}`);
  note(was.credibleLevel !== is.credibleLevel, `level ${formatPlain(100 * is.credibleLevel)} %`);
  if (was.detections !== is.detections) {
    changes.push(is.detections === 'none' ? 'detections set aside' : 'detections counted');
  } else {
    const more = after.detections - before.detections;
    note(more !== 0, counted(more, 'detection', 'detections'));
  }
  note(was.combination !== is.combination, `shared stars: ${is.combination.replace('-', ' ')}`);
  note(before.cooling !== after.cooling, after.cooling);
  note(before.engineVersion !== after.engineVersion, `engine ${after.engineVersion}`);
  return changes;
}

/** The staircase of a limit: each run with what is new since the one before. */
export function describeSteps(runs: HistoryRun[]): Overview['history'] {
  return runs.map((run, i) => {
    const { at, run: number, limit, zeroLimit } = run;
    return {
      at: at.toISOString(),
      run: number,
      limit,
      zeroLimit,
      label: labelOf(runs[i - 1], run),
    };
  });
}

function labelOf(before: HistoryRun | undefined, after: HistoryRun): string {
  if (!before) return `${after.stars} stars`;
  const changes = changesBetween(before, after);
  if (changes.length > 0) return changes.join(', ');
  return before.inputsDigest === after.inputsDigest ? 'run again' : 'other maps';
}
