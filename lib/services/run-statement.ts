import type { Actor } from '@/lib/access/actor';
import { InputError } from '@/lib/errors';
import { describeLevel } from '@/lib/inference';
import { type RunToState, stateRun } from '@/lib/inference/run-statement';
import { type LimitDocument, limitDocument } from '@/lib/inference/statement-document';
import type { StatementQuery } from '@/lib/schemas/statement';
import type { FinishedRun } from './export-limits';
import { getFinishedRun } from './exports';

/** A finished run as its statements are made from it. */
function toState(runId: string, run: FinishedRun): RunToState {
  const { key, version, digest } = run.inputs.population;
  return {
    run: {
      id: runId,
      analysis: run.analysis,
      number: run.number,
      engineVersion: run.engineVersion,
      resultDigest: run.resultDigest,
      population: { key, version, digest },
    },
    population: run.population,
    recipe: run.recipe,
    inputs: run.inputs,
    result: run.result,
  };
}

/**
 * One of a run's recorded limits with everything that it rests on.
 *
 * @throws InputError for a level or quantity that the run did not record, naming those it did
 */
export async function getRunStatement(
  actor: Actor,
  runId: string,
  query: Omit<StatementQuery, 'as'>,
): Promise<LimitDocument> {
  const run = await getFinishedRun(actor, runId);
  const stated = stateRun(toState(runId, run), query);
  if (stated) return limitDocument(stated);
  const levels = run.result.levels.map(({ level }) => level);
  const known = levels.some((level) => Math.abs(level - (query.level ?? level)) < 1e-9);
  throw new InputError({
    code: 'not-recorded',
    column: known ? 'quantity' : 'level',
    found: known ? 'a quantity without a limit in this run' : describeLevel(query.level ?? 0),
    expected: known
      ? 'a quantity that the prior of the run has a counterpart for'
      : `one of ${levels.join(', ')}`,
  });
}
