import { QueryTypes } from 'sequelize';
import type { JobView } from '@/lib/schemas/jobs';
import { database, JobRow, PersonRow, ShareRow, type SurveyRow } from '@/models';
import { readMapStates } from '@/models/map-standings';
import { describeJobs } from './jobs';
import { isArchived } from './sharing/archived';
import { currentYardstick, type Yardstick } from './survey-depth';

export interface SurveyCounts {
  targets: number;
  shared: number;
  curves: number;
  none: number;
  waiting: number;
  ready: number;
  failed: number;
  confirmed: number;
  candidate: number;
  ambiguous: number;
  background: number;
  /** Maps of the targets that count: of none left out, of none chosen for a known companion. */
  mapIds: string[];
}

/** What hangs on surveys, read for all of them at once: as many questions for fifty as for one. */
export interface SurveyFacts {
  countsOf: Map<string, SurveyCounts>;
  leadOf: Map<string, PersonRow>;
  /** The newest job of its maps. */
  jobOf: Map<string, JobView>;
  shareOf: Map<string, ShareRow>;
  /** Maps that are not what their curves should give now, of surveys that rest. */
  staleOf: Map<string, number>;
  yardstick: Yardstick;
}

/** Each table is read and grouped once, and not once a target. */
const COUNTS = `
  with own as (select * from target where survey_id = any($1::uuid[])),
    curve as (
      select o.survey_id, count(*)::int as curves
      from contrast_curve c join own o on o.id = c.target_id
      where c.replaced_at is null group by o.survey_id),
    found as (
      select o.survey_id,
        (count(*) filter (where c.status = 'confirmed'))::int as confirmed,
        (count(*) filter (where c.status = 'candidate'))::int as candidate,
        (count(*) filter (where c.status = 'ambiguous'))::int as ambiguous,
        (count(*) filter (where c.status = 'background'))::int as background
      from companion c join own o on o.id = c.target_id group by o.survey_id),
    several as (
      select star_id from target where collaboration_id = $2
      group by star_id having min(survey_id::text) <> max(survey_id::text)),
    held as (
      select o.survey_id, count(*)::int as targets,
        (count(*) filter (where o.star_id in (select star_id from several)))::int as shared,
        (count(*) filter (where o.map_state = 'none'))::int as none,
        (count(*) filter (where o.map_state = 'waiting'))::int as waiting,
        (count(*) filter (where o.map_state = 'ready'))::int as ready,
        (count(*) filter (where o.map_state = 'failed'))::int as failed,
        coalesce(array_agg(o.map_id) filter (
          where o.map_state = 'ready' and o.left_out_reason is null and o.map_id is not null
            and o.attributes->'selectedForCompanion' is distinct from 'true'::jsonb),
          '{}') as "mapIds"
      from own o group by o.survey_id)
  select held.*, coalesce(curve.curves, 0) as curves,
    coalesce(confirmed, 0) as confirmed, coalesce(candidate, 0) as candidate,
    coalesce(ambiguous, 0) as ambiguous, coalesce(background, 0) as background
  from held left join curve using (survey_id) left join found using (survey_id)`;

const NEWEST_JOBS = `
  select distinct on (survey_id) id from job
  where survey_id = any($1::uuid[]) and kind = 'compute-maps'
  order by survey_id, created_at desc`;

async function readCounts(collaborationId: string, ids: string[]) {
  const rows = await database().query<SurveyCounts & { survey_id: string }>(COUNTS, {
    bind: [ids, collaborationId],
    type: QueryTypes.SELECT,
  });
  return new Map(rows.map(({ survey_id, ...counts }) => [survey_id, counts]));
}

async function readJobs(ids: string[]): Promise<Map<string, JobView>> {
  const newest = await database().query<{ id: string }>(NEWEST_JOBS, {
    bind: [ids],
    type: QueryTypes.SELECT,
  });
  const jobs = await JobRow.findAll({ where: { id: newest.map(({ id }) => id) } });
  const views = await describeJobs(jobs);
  return new Map(jobs.map(({ surveyId }, i) => [surveyId as string, views[i]]));
}

/** Maps on their way change from look to look: only where none is, are they looked through. */
async function countStale(
  surveys: SurveyRow[],
  jobOf: ReadonlyMap<string, JobView>,
): Promise<Map<string, number>> {
  const isOpen = ({ id }: SurveyRow) =>
    ['waiting', 'running'].includes(jobOf.get(id)?.status ?? '');
  const resting = surveys.filter((survey) => !isArchived(survey) && !isOpen(survey));
  const counts = new Map<string, number>();
  for (const [id, states] of await readMapStates(resting)) {
    counts.set(id, states.filter(({ standing }) => standing === 'stale').length);
  }
  return counts;
}

const byId = <Row extends { id: string }>(rows: Row[]) => new Map(rows.map((row) => [row.id, row]));

export async function readSurveyFacts(
  collaborationId: string,
  surveys: SurveyRow[],
): Promise<SurveyFacts> {
  const ids = surveys.map(({ id }) => id);
  const jobs = readJobs(ids);
  const [countsOf, jobOf, staleOf, leads, shares, yardstick] = await Promise.all([
    readCounts(collaborationId, ids),
    jobs,
    jobs.then((jobOf) => countStale(surveys, jobOf)),
    PersonRow.findAll({ where: { id: surveys.flatMap(({ leadId }) => leadId ?? []) } }),
    ShareRow.findAll({ where: { id: surveys.flatMap(({ shareId }) => shareId ?? []) } }),
    currentYardstick(collaborationId),
  ]);
  return { countsOf, jobOf, staleOf, leadOf: byId(leads), shareOf: byId(shares), yardstick };
}
