import { QueryTypes } from 'sequelize';
import { database } from './index';
import type { RunRow } from './run';

/** Each version once, the oldest first. */
export const inOrder = (engines: string[]): string[] =>
  [...new Set(engines)].sort((a, b) => a.localeCompare(b, 'en', { numeric: true }));

/** What helps where maps of surveys are not what the present engine gives. */
export const refreshWords = (surveys: string[]): string =>
  `Refresh the maps of ${surveys.join(', ')} (survey, Maps), run again, freeze that run`;

/** Maps of a run, and those that its combined ones were put together from. */
const ENGINES = `
  with own as (
    select m.* from run_star s join completeness_map m on m.id = s.map_id where s.run_id = $1)
  select engine_version as engine from own
    where origin = 'computed' and not (inputs ? 'maps')
  union
  select p.engine_version from own o
    cross join lateral jsonb_array_elements_text(o.inputs->'maps') as part(digest)
    join completeness_map p
      on p.collaboration_id = o.collaboration_id and p.digest = part.digest
    where o.inputs ? 'maps' and p.origin = 'computed'`;

/** Versions of the engine that made a run's maps: as the run says, else as its stored maps say. */
export async function enginesOfRun(run: Pick<RunRow, 'id' | 'inputs'>): Promise<string[]> {
  if (run.inputs?.mapEngines) return run.inputs.mapEngines;
  const rows = await database().query<{ engine: string }>(ENGINES, {
    bind: [run.id],
    type: QueryTypes.SELECT,
  });
  return inOrder(rows.map(({ engine }) => engine));
}
