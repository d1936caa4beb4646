import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import type { StudySummary } from '@/lib/schemas/studies';
import { AnalysisRow, JobRow, PersonRow, RunRow, type StudyRow } from '@/models';
import type { JobStatus } from '@/models/job';
import { describeJobs } from './jobs';

/** A summary without what depends on who reads it. */
export interface Summarised extends Omit<StudySummary, 'can'> {
  askedBy: string | null;
}

/** What a member sees of it. */
export function shownTo(actor: Actor, { askedBy, ...summary }: Summarised): StudySummary {
  const isAllowed = may(actor, 'run-analysis', { isOwn: askedBy === actor.personId });
  return { ...summary, can: { remove: isAllowed && hasEnded(summary.job.status) } };
}

export const hasEnded = (status: JobStatus) => status !== 'waiting' && status !== 'running';

export async function summarise(rows: StudyRow[]): Promise<Summarised[]> {
  if (rows.length === 0) return [];
  const runs = await RunRow.findAll({
    attributes: ['id', 'number', 'analysisId'],
    where: { id: rows.map(({ runId }) => runId) },
  });
  const analyses = await AnalysisRow.findAll({
    where: { id: runs.map(({ analysisId }) => analysisId) },
  });
  const people = await PersonRow.findAll({
    attributes: ['id', 'name'],
    where: { id: rows.flatMap(({ createdBy }) => createdBy ?? []) },
  });
  const jobs = await describeJobs(
    await JobRow.findAll({ where: { id: rows.map(({ jobId }) => jobId) } }),
  );
  const byId = <Row extends { id: string }>(all: Row[]) => new Map(all.map((row) => [row.id, row]));
  const [runOf, analysisOf, personOf, jobOf] = [
    byId(runs),
    byId(analyses),
    byId(people),
    byId(jobs),
  ];
  return rows.flatMap((row) => {
    const run = runOf.get(row.runId);
    const analysis = run && analysisOf.get(run.analysisId);
    const job = jobOf.get(row.jobId);
    // Deleted between the statements.
    if (!run || !analysis || !job) return [];
    return {
      id: row.id,
      number: row.number,
      settings: row.settings,
      run: {
        id: run.id,
        number: run.number,
        analysisKey: `A-${analysis.number}`,
        analysisName: analysis.name,
      },
      job,
      headline: row.headline ?? null,
      createdBy: personOf.get(row.createdBy ?? '')?.name ?? null,
      createdAt: row.createdAt.toISOString(),
      finishedAt: row.finishedAt?.toISOString() ?? null,
      askedBy: row.createdBy ?? null,
    };
  });
}
