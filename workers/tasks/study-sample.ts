import { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { listFirst } from '@/lib/queue/preconditions';
import { database } from '@/models';
import { mapDigest, mapInputs } from '@/models/map-recipe';
import { buildStarInputs } from '@/models/star-inputs';
import { combineMaps, ownCurves } from './run-maps';
import { collectSample, type Sample, type SampleStar } from './run-sample';
import type { StudyWork } from './study-context';

/** Stars whose stored map is not what their entries would give now. */
function findChangedEntries(stars: SampleStar[]): string[] {
  const isChanged = ({ entries }: SampleStar) =>
    entries.some((entry) => {
      if (entry.map.origin === 'uploaded') return false;
      const own = ownCurves({ entries: [entry] });
      const star = buildStarInputs(entry.target, own);
      return mapDigest(mapInputs(star, own, entry.survey.recipe)) !== entry.map.digest;
    });
  return stars.filter(isChanged).map(({ name }) => name);
}

/**
 * The stars of a run with their entries and curves, for maps made anew.
 *
 * @throws InputError where something has changed since the run: what is computed from it would not
 *   be compared with the same
 */
export async function loadRunSample(given: StudyWork): Promise<Sample> {
  const { run, work, grid, collaborationId } = given;
  const { REPEATABLE_READ: isolationLevel } = Transaction.ISOLATION_LEVELS;
  const sample = await database().transaction({ isolationLevel }, (transaction) =>
    collectSample(collaborationId, run.recipe, transaction),
  );
  const changed = new Set(findChangedEntries(sample.stars));
  const digests = await combineMaps(
    work,
    { ...sample, stars: sample.stars.filter(({ name }) => !changed.has(name)) },
    run.recipe.combination,
    grid,
    (done, total) => given.report('collect', done, total),
  );
  const before = new Map(run.inputs.stars.map(({ starId, mapDigest: digest }) => [starId, digest]));
  for (const { starId, name } of sample.stars) {
    if (before.get(starId) !== digests.get(starId)) changed.add(name);
    before.delete(starId);
  }
  for (const { starId, name } of run.inputs.stars) if (before.has(starId)) changed.add(name);
  if (changed.size === 0) return sample;
  throw new InputError({
    code: 'changed-since',
    message:
      `Changed since this run, or mapped by an older engine: ${listFirst([...changed])}. ` +
      'Run the analysis again and ask the new run',
  });
}
