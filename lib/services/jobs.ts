import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { requestCancel, retry } from '@/lib/queue/cancel';
import { timeLeftS } from '@/lib/queue/pace';
import { idSchema } from '@/lib/schemas/common';
import type { JobView } from '@/lib/schemas/jobs';
import type { StudyKind } from '@/lib/schemas/study-settings';
import {
  AnalysisRow,
  database,
  inTransaction,
  JobRow,
  RunRow,
  StudyRow,
  SurveyRow,
} from '@/models';
import { recordAudit } from './audit';
import { studyNames } from './study-words';

interface Subject {
  job_id: string;
  subject: string;
  kind: StudyKind | null;
  slug: string | null;
  analysis: number | null;
  study_id: string | null;
  release: number | null;
}

function pageOf({ slug, analysis, kind, study_id, release }: Subject): string | null {
  if (release !== null) return `releases/R-${release}`;
  if (slug !== null) return `surveys/${slug}`;
  if (kind === 'forecast') return `forecasts/${study_id}`;
  if (analysis === null) return null;
  const studies = kind === null ? '' : kind === 'calibration' ? '/calibration' : `/studies/${kind}`;
  return `analyses/A-${analysis}${studies}`;
}

/** What each job works on: a survey's name or an analysis's key with the run's number and question. */
async function subjectsOf(
  jobs: JobRow[],
): Promise<Map<string, { words: string; page: string | null }>> {
  if (jobs.length === 0) return new Map();
  const rows = await database().query<Subject>(
    `select j.id as job_id,
       coalesce(s.name, 'R-' || e.number, 'A-' || a.number || ', run ' || r.number, '') as subject,
       f.kind, e.number as release,
       s.slug, a.number as analysis, f.id as study_id
     from job j left join survey s on s.id = j.survey_id left join deposit d on d.job_id = j.id
       left join release e on e.job_id = j.id or e.id = d.release_id
       left join study f on f.job_id = j.id left join run r on r.job_id = j.id or r.id = f.run_id
       left join analysis a on a.id = r.analysis_id
     where j.id = any($1::uuid[])`,
    { bind: [jobs.map(({ id }) => id)], type: QueryTypes.SELECT },
  );
  return new Map(
    rows.map((row) => [
      row.job_id,
      {
        words: row.kind === null ? row.subject : `${row.subject}: ${studyNames[row.kind]}`,
        page: pageOf(row),
      },
    ]),
  );
}

export async function describeJobs(jobs: JobRow[]): Promise<JobView[]> {
  const subjects = await subjectsOf(jobs);
  const now = new Date();
  return jobs.map((job) => ({
    id: job.id,
    kind: job.kind,
    status: job.status,
    stage: job.stage,
    done: job.doneCount,
    total: job.totalCount,
    attempts: job.attempts,
    timeLeftS: timeLeftS(job, now),
    cancelRequested: job.cancelRequestedAt !== null && job.status === 'running',
    fault: job.fault,
    subject: subjects.get(job.id)?.words ?? '',
    page: job.kind === 'export-collaboration' ? 'settings' : (subjects.get(job.id)?.page ?? null),
    createdAt: job.createdAt.toISOString(),
    startedAt: job.startedAt?.toISOString() ?? null,
    finishedAt: job.finishedAt?.toISOString() ?? null,
  }));
}

export async function describeJob(job: JobRow): Promise<JobView> {
  const [view] = await describeJobs([job]);
  return view;
}

/** The newest jobs of the collaboration; those that are open first. */
export async function listJobs(
  actor: Actor,
  { limit, offset }: { limit: number; offset: number },
): Promise<{ jobs: JobView[] }> {
  demand(actor, 'read');
  const jobs = await JobRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [
      [database().literal(`status in ('waiting', 'running')`) as never, 'DESC'],
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit,
    offset,
  });
  return { jobs: await describeJobs(jobs) };
}

async function findJob(actor: Actor, id: string): Promise<JobRow> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const job = isId
    ? await JobRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  if (!job) throw new NotFound('job');
  return job;
}

export async function getJob(actor: Actor, id: string): Promise<JobView> {
  return describeJob(await findJob(actor, id));
}

/** Who may start the work may stop it and start it again. */
async function demandControl(actor: Actor, job: JobRow): Promise<void> {
  if (job.kind === 'compute-maps') {
    const survey = await SurveyRow.findByPk(job.surveyId as string, { rejectOnEmpty: true });
    demand(actor, 'import', { isLead: survey.leadId === actor.personId });
    return;
  }
  if (job.kind === 'verify-release') return demand(actor, 'agree-release');
  if (job.kind === 'deposit-release') return demand(actor, 'deposit-release');
  if (job.kind === 'export-collaboration') return demand(actor, 'manage-collaboration');
  const study =
    job.kind === 'compute-study'
      ? await StudyRow.findOne({ where: { jobId: job.id }, rejectOnEmpty: true })
      : null;
  const where = study ? { id: study.runId } : { jobId: job.id };
  const run = await RunRow.findOne({ where, rejectOnEmpty: true });
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const isOwnStudy = study !== null && study.createdBy === actor.personId;
  const isOwn = isOwnStudy || analysis.createdBy === actor.personId;
  demand(actor, 'run-analysis', { isOwn });
}

const actionOf = {
  'compute-maps': 'import',
  'compute-run': 'run-analysis',
  'compute-study': 'run-analysis',
  'verify-release': 'agree-release',
  'recreate-run': 'run-analysis',
  'deposit-release': 'deposit-release',
  'export-collaboration': 'export',
} as const;

/** Stops a job: a waiting one at once, a running one within seconds. */
export async function cancelJob(actor: Actor, id: string): Promise<JobView> {
  const job = await findJob(actor, id);
  await demandControl(actor, job);
  await inTransaction(async (transaction) => {
    if (!(await requestCancel(transaction, job.id))) {
      throw new Conflict('The job has ended already: there is nothing to stop');
    }
    const item = { kind: 'job', id: job.id };
    await recordAudit(actor, actionOf[job.kind], item, 'stopped a computation', transaction);
  });
  return describeJob(await job.reload());
}

/** Starts a job again that failed or was stopped; what it had stored is not computed anew. */
export async function retryJob(actor: Actor, id: string): Promise<JobView> {
  const job = await findJob(actor, id);
  await demandControl(actor, job);
  await inTransaction(async (transaction) => {
    await retry(transaction, job);
    const item = { kind: 'job', id: job.id };
    await recordAudit(actor, actionOf[job.kind], item, 'started a computation again', transaction);
  });
  return describeJob(await job.reload());
}
