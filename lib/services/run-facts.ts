import { QueryTypes } from 'sequelize';
import type { RunSummary } from '@/lib/schemas/runs';
import { database } from '@/models';
import { findOlderInputs } from './older-inputs';

type RunFacts = Omit<RunSummary, 'job'> & { analysisId: string; jobId: string };

interface Row {
  id: string;
  analysisId: string;
  jobId: string;
  number: number;
  createdBy: string | null;
  createdAt: Date;
  finishedAt: Date | null;
  quantity: RunSummary['quantity'];
  credibleLevel: number;
  limit: number | null;
  zeroLimit: number | null;
  median: number | null;
  interval68: [number, number] | null;
  detections: number | null;
  stars: number | null;
  resultDigest: string | null;
  hasResult: boolean;
  surveyIds: string[];
  startedS: number;
  frozen: RunSummary['frozen'];
  withdrawn: RunSummary['withdrawn'] | null;
}

/** A result is some 90 kB that is unpacked at each look into it: once a run, by jsonb_to_record. */
const FACTS = `
  select r.id, r.analysis_id as "analysisId", r.job_id as "jobId", r.number,
    p.name as "createdBy", r.created_at as "createdAt", r.finished_at as "finishedAt",
    x.quantity,
    (r.recipe->>'credibleLevel')::float8 as "credibleLevel",
    (x.answer->>'limit')::float8 as "limit", (x.zero->>'limit')::float8 as "zeroLimit",
    (x.answer->>'median')::float8 as median, x.answer->'interval68' as interval68,
    jsonb_array_length(x.counted) as detections, x.stars, r.result_digest as "resultDigest",
    r.result is not null as "hasResult", q.survey_ids as "surveyIds",
    extract(epoch from j.started_at)::float8 as "startedS",
    (select case when exists (
        select 1 from release_run q join release e on e.id = q.release_id
        where q.run_id = r.id and e.published_at is not null and e.withdrawn_at is null)
      then 'released' else 'frozen' end
      from frozen_run z where z.run_id = r.id) as frozen,
    (select jsonb_agg(jsonb_build_object('survey', s.name, 'owner', x.owner_name,
        'from', x.withdrawn_from, 'why', x.withdrawn_why) order by s.position)
      from survey s join share x on x.id = s.share_id
      where s.id = any(q.survey_ids) and x.withdrawn_from is not null) as withdrawn
  from run r join job j on j.id = r.job_id left join person p on p.id = r.created_by
    cross join lateral (
      select array(select jsonb_array_elements_text(r.recipe->'surveyIds')::uuid) as survey_ids) q
    left join lateral jsonb_to_record(r.result) as x(
      quantity text, stars int, answer jsonb, zero jsonb, counted jsonb) on true
  where r.analysis_id = any($1::uuid[])
  order by r.number desc`;

/** The numbers that lists of runs show, without reading whole results. */
export async function readRunFacts(analysisIds: string[]): Promise<RunFacts[]> {
  if (analysisIds.length === 0) return [];
  const rows = await database().query<Row>(FACTS, { bind: [analysisIds], type: QueryTypes.SELECT });
  const older = await findOlderInputs(rows.filter(({ hasResult }) => hasResult));
  return rows.map(({ withdrawn, hasResult, surveyIds, startedS, ...row }) => ({
    ...row,
    ...(withdrawn && { withdrawn }),
    hasOlderInputs: older.has(row.id),
    createdAt: row.createdAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
  }));
}
