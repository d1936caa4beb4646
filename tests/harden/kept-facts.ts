import { portableDigests } from '@/models/portable-digest';
import type { RunRow } from '@/models/run';
import { query } from './founders';

/** One line a thing: what it is called and a digest of what it holds, without ids and times. */
const LINES = `
  select 'survey ' || name as line from survey
  union all select 'target ' || s.name || ' ' || t.name || ' ' || t.map_state || ' ' || coalesce(m.digest, '-')
    from target t join survey s on s.id = t.survey_id left join completeness_map m on m.id = t.map_id
  union all select 'curve ' || t.name || ' ' || c.digest
    from contrast_curve c join target t on t.id = c.target_id
  union all select 'star ' || name from star
  union all select 'map ' || digest || ' ' || encode(sha256(node_values), 'hex') from completeness_map
  union all select 'upload ' || file_name || ' ' || state || ' ' || u.sha256 || ' ' ||
      encode(sha256(string_agg(p.bytes, ''::bytea order by p.part_number)), 'hex')
    from upload u join upload_part p on p.upload_id = u.id group by u.id
  union all select 'population ' || name || ' ' || digest from population
  union all select 'analysis ' || name from analysis
  union all select 'job ' || kind || ' ' || status from job
  union all select 'frozen ' || a.name from frozen_run f join run r on r.id = f.run_id
    join analysis a on a.id = r.analysis_id
  union all select 'release ' || title || ' ' || (published_at is not null)::text || ' ' ||
      coalesce(verification ->> 'isSame', '-') from release
  union all select 'release file ' || r.title || ' ' || f.media_type
    from release_file f join release r on r.id = f.release_id
  union all select 'audit ' || action from audit_entry
  union all select 'left in the queue ' || id from queue._private_jobs`;

type Finished = Pick<RunRow, 'recipe' | 'inputs' | 'result'> & { name: string };

/** Without what each run draws anew, its seed and the ids after which its stars are listed. */
function alike<Run extends Pick<Finished, 'inputs'>>({ inputs, ...run }: Run) {
  const byName = (a: { name: string }, b: { name: string }) => (a.name < b.name ? -1 : 1);
  const same = inputs && { ...inputs, seed: '', stars: [...inputs.stars].sort(byName) };
  return { ...run, inputs: same };
}

/** Everything that a laboratory holds, one line a thing, in an order that does not depend on time. */
export async function keptFacts(databaseUrl: string): Promise<string[]> {
  const rows = await query<{ line: string }>(databaseUrl, LINES);
  const runs = await query<Finished>(
    databaseUrl,
    `select a.name, r.recipe, r.inputs, r.result from run r join analysis a on a.id = r.analysis_id`,
  );
  const results = runs.map(({ name, ...run }) => {
    const { portableInputs, portableResult } = portableDigests(alike(run));
    return `run ${name} ${portableInputs} ${portableResult}`;
  });
  return [...rows.map(({ line }) => line), ...results].sort();
}

/** What one list has more often than the other. */
export function missingFrom(there: string[], wanted: string[]): string[] {
  const left = new Map<string, number>();
  for (const line of there) left.set(line, (left.get(line) ?? 0) + 1);
  return wanted.filter((line) => {
    const count = left.get(line) ?? 0;
    left.set(line, count - 1);
    return count <= 0;
  });
}
