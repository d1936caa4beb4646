import { QueryTypes } from 'sequelize';
import { database } from '@/models';
import { OUTSIDE_SAMPLE } from '@/models/sample-selection';

/** A finished run, as far as its inputs are concerned. */
export interface ReadInputs {
  id: string;
  surveyIds: string[];
  /** When it began to read [s since 1970]. */
  startedS: number;
}

interface Standing {
  surveyId: string;
  /** Of the newest target, map, curve or companion, and of the newest withdrawal [s since 1970]. */
  changedS: number | null;
  /** Differs when another star, map or target is there, or one is counted no more. */
  stamp: string;
}

/** Where each survey stands now: one pass over its rows, whatever the number of runs. */
const STANDINGS = `
  select v.id as "surveyId",
    extract(epoch from greatest(
      (select max(greatest(t.created_at, m.created_at)) from target t
        left join completeness_map m on m.id = t.map_id
        where t.survey_id = v.id and t.left_out_reason is null),
      (select max(greatest(c.created_at, c.replaced_at)) from contrast_curve c
        join target t on t.id = c.target_id
        where t.survey_id = v.id and t.left_out_reason is null),
      (select max(k.created_at) from companion k join target t on t.id = k.target_id
        where t.survey_id = v.id and t.left_out_reason is null),
      (select max(u.withdrawn_at) from upload u where u.survey_id = v.id)))::float8 as "changedS",
    (select count(*) || ' ' || coalesce(bit_xor(hashtextextended(concat_ws(' ', t.star_id,
        coalesce(t.map_id::text, '-'), t.left_out_reason is null,
        coalesce(t.attributes->>'selectedForCompanion', '-'), t.name, v.name), 0)), 0)
      from target t where t.survey_id = v.id) as stamp
  from survey v where v.id = any($1::uuid[])`;

/** A target that a run of this recipe counts, apart from what its sample asks of the star. */
const IS_COUNTED = `t.left_out_reason is null
        and (chosen.definition->>'knownCompanion' = 'kept'
          or t.attributes->>'selectedForCompanion' is distinct from 'true')`;

/** Runs that would read other stars now, or another map of a star that one survey lists. */
const CHANGED = `
  select r.id from run r left join sample chosen on chosen.id = (r.recipe->>'sampleId')::uuid
    cross join lateral (
      select array(select jsonb_array_elements_text(r.recipe->'surveyIds')::uuid) as survey_ids) q
  where r.id = any($1::uuid[]) and (
    exists (
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

/** Enough for every run of some hundred analyses; the oldest entry goes first. */
const CACHE_SIZE = 10_000;
/** What a run never changes was compared with this standing of its surveys already. */
const compared = new Map<string, { stamp: string; isOlder: boolean }>();

async function readStandings(surveyIds: string[]): Promise<Map<string, Standing>> {
  const rows = await database().query<Standing>(STANDINGS, {
    bind: [surveyIds],
    type: QueryTypes.SELECT,
  });
  return new Map(rows.map((row) => [row.surveyId, row]));
}

async function compare(stampOf: ReadonlyMap<string, string>): Promise<void> {
  const unknown = [...stampOf].filter(([id, stamp]) => compared.get(id)?.stamp !== stamp);
  if (unknown.length === 0) return;
  const changed = await database().query<{ id: string }>(CHANGED, {
    bind: [unknown.map(([id]) => id)],
    type: QueryTypes.SELECT,
  });
  const older = new Set(changed.map(({ id }) => id));
  for (const [id, stamp] of unknown) compared.set(id, { stamp, isOlder: older.has(id) });
  while (compared.size > CACHE_SIZE) compared.delete(compared.keys().next().value as string);
}

/**
 * The runs whose surveys have changed since they were read: other stars, another map of a star that
 * one survey lists, a target, curve, map or companion that came later, or a file withdrawn since.
 *
 * @param runs finished ones
 * @returns their ids
 */
export async function findOlderInputs(runs: ReadInputs[]): Promise<ReadonlySet<string>> {
  if (runs.length === 0) return new Set();
  const standings = await readStandings([...new Set(runs.flatMap(({ surveyIds }) => surveyIds))]);
  const stampOf = new Map<string, string>();
  const older = new Set<string>();
  for (const { id, surveyIds, startedS } of runs) {
    const own = surveyIds.flatMap((surveyId) => standings.get(surveyId) ?? []);
    if (own.some(({ changedS }) => changedS !== null && changedS > startedS)) older.add(id);
    else stampOf.set(id, own.map(({ surveyId, stamp }) => `${surveyId} ${stamp}`).join(', '));
  }
  await compare(stampOf);
  for (const id of stampOf.keys()) if (compared.get(id)?.isOlder) older.add(id);
  return older;
}
