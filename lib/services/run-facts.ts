import { QueryTypes } from 'sequelize';
import type { RunSummary } from '@/lib/schemas/runs';
import { database } from '@/models';
import { OUTSIDE_SAMPLE } from '@/models/sample-selection';

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
  hasOlderInputs: boolean;
  frozen: RunSummary['frozen'];
  withdrawn: RunSummary['withdrawn'] | null;
}

/** A target that a run of this recipe counts, apart from what its sample asks of the star. */
const IS_COUNTED = `t.left_out_reason is null
        and (chosen.definition->>'knownCompanion' = 'kept'
          or t.attributes->>'selectedForCompanion' is distinct from 'true')`;

/**
 * Whether the surveys have changed since a run read them: other stars, another map of a star that
 * one survey lists, a target, curve, map or companion that came later, or a file withdrawn since.
 */
const OLDER_INPUTS = `
  r.result is not null and (
    exists (
      select 1 from target t
        left join completeness_map m on m.id = t.map_id
        left join contrast_curve c on c.target_id = t.id
        left join companion k on k.target_id = t.id
      where t.survey_id = any(q.survey_ids) and t.left_out_reason is null
        and greatest(t.created_at, m.created_at, c.created_at, c.replaced_at, k.created_at)
          > j.started_at)
    or exists (
      select 1 from upload u
      where u.survey_id = any(q.survey_ids) and u.withdrawn_at > j.started_at)
    or exists (
      select t.star_id from target t
      where t.survey_id = any(q.survey_ids) and t.map_id is not null and ${IS_COUNTED}
        and not (chosen.id is not null and exists (
          select 1 from jsonb_to_recordset(r.inputs->'leftOut') as l(name text, survey text, reason text)
            join survey v on v.id = t.survey_id and v.name = l.survey
          where l.name = t.name and l.reason = '${OUTSIDE_SAMPLE}'))
      except select star_id from run_star where run_id = r.id)
    or exists (
      select s.star_id from run_star s where s.run_id = r.id
      except select t.star_id from target t
      where t.survey_id = any(q.survey_ids) and t.map_id is not null and ${IS_COUNTED})
    or exists (
      select 1 from run_star s join target t
        on t.star_id = s.star_id and t.survey_id = s.survey_ids[1]
      where s.run_id = r.id and cardinality(s.survey_ids) = 1 and t.map_id is distinct from s.map_id))`;

const FACTS = `
  select r.id, r.analysis_id as "analysisId", r.job_id as "jobId", r.number,
    p.name as "createdBy", r.created_at as "createdAt", r.finished_at as "finishedAt",
    r.result->>'quantity' as quantity,
    (r.recipe->>'credibleLevel')::float8 as "credibleLevel",
    (r.result->'answer'->>'limit')::float8 as "limit",
    (r.result->'zero'->>'limit')::float8 as "zeroLimit",
    (r.result->'answer'->>'median')::float8 as median,
    r.result->'answer'->'interval68' as interval68,
    jsonb_array_length(r.result->'counted') as detections,
    (r.result->>'stars')::int as stars, r.result_digest as "resultDigest",
    ${OLDER_INPUTS} as "hasOlderInputs",
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
    left join sample chosen on chosen.id = (r.recipe->>'sampleId')::uuid
    cross join lateral (
      select array(select jsonb_array_elements_text(r.recipe->'surveyIds')::uuid) as survey_ids) q
  where r.analysis_id = any($1::uuid[])
  order by r.number desc`;

/** The numbers that lists of runs show, without reading whole results. */
export async function readRunFacts(analysisIds: string[]): Promise<RunFacts[]> {
  if (analysisIds.length === 0) return [];
  const rows = await database().query<Row>(FACTS, { bind: [analysisIds], type: QueryTypes.SELECT });
  return rows.map(({ withdrawn, ...row }) => ({
    ...row,
    ...(withdrawn && { withdrawn }),
    createdAt: row.createdAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
  }));
}
