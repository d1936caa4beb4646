import { hold } from '@/lib/queue/attempt';
import { select } from '@/lib/queue/statement';
import { inTransaction } from '@/models';
import { canonicalJson } from '@/models/digest';
import { inLanes } from '../lanes';
import type { StudyWork } from './study-context';

/** A long computation in parts that do not depend on each other. */
export interface PartedWork<Part> {
  parts: number;
  /** Name of the stage while parts are computed, counted in `units` a part. */
  stage: string;
  unitsOf(part: number): number;
  compute(part: number): Promise<Part>;
}

interface StoredPart<Part> {
  part: number;
  result: Part;
}

/**
 * Computes the parts of a study that are not stored yet; each is stored at once, behind the fence,
 * so that a worker which is killed loses only what its threads were at.
 *
 * @returns one result a part, in their order, as the database gives them: whether a part was stored
 *   now or before makes no difference
 */
export async function computeParts<Part extends object>(
  given: StudyWork,
  { parts, stage, unitsOf, compute }: PartedWork<Part>,
): Promise<Part[]> {
  const { work, study } = given;
  const readParts = () =>
    select<StoredPart<Part>>(
      'select part, result from study_part where study_id = $1 order by part',
      [study.id],
    );
  const stored = new Set((await readParts()).map(({ part }) => part));
  const all = Array.from({ length: parts }, (_, part) => part);
  const total = all.reduce((sum, part) => sum + unitsOf(part), 0);
  const missing = all.filter((part) => !stored.has(part));
  let done = total - missing.reduce((sum, part) => sum + unitsOf(part), 0);
  await given.report(stage, done, total);
  await inLanes(missing, work.pool.threads + 1, async (part) => {
    const result = await compute(part);
    await inTransaction(async (transaction) => {
      await hold(transaction, work.attempt);
      await select(
        `insert into study_part (study_id, part, result) values ($1, $2, $3::jsonb)
         on conflict do nothing returning part`,
        [study.id, part, canonicalJson(result)],
        transaction,
      );
    });
    done += unitsOf(part);
    await given.report(stage, done, total);
  });
  return (await readParts()).map(({ result }) => result);
}
