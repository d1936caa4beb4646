import { NotFound } from '@/lib/errors';
import { RunRow, TargetRow } from '@/models';
import type { Work } from '../perform';
import { completeSurvey } from './compute-maps';
import { performComputeRun } from './compute-run';

/**
 * Computes a run that a bundle brought in: the maps of its surveys first, from their curves, then
 * the run itself as any other. Ready maps came with the bundle and stay as they are.
 */
export async function performRecreateRun(work: Work): Promise<void> {
  const { collaborationId, jobId } = work.attempt;
  const run = await RunRow.findOne({ where: { jobId, collaborationId } });
  if (!run) throw new NotFound('run for this job');
  for (const surveyId of run.recipe.surveyIds) {
    const targets = await TargetRow.findAll({
      attributes: ['id'],
      where: { surveyId, collaborationId, mapState: ['none', 'waiting'] },
    });
    const targetIds = targets.map(({ id }) => id);
    if (targetIds.length > 0) await completeSurvey(work, { surveyId, targetIds });
  }
  await performComputeRun(work);
}
