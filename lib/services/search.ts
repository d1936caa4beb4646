import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { foldName } from '@/lib/formats';
import { MOST_OF_A_KIND, type SearchHit } from '@/lib/schemas/search';
import { database } from '@/models';
import { together } from './together';

/** In a pattern the three signs stand for themselves. */
const literal = (text: string) => text.replace(/[\\%_]/g, (sign) => `\\${sign}`);

/** 0 for the very name, 1 for its beginning, 2 for anywhere inside. */
const closeness = (folded: string) =>
  `case when ${folded} = $4 then 0 when ${folded} like $5 then 1 else 2 end`;

/** The same for a name that has no folded column: as foldName does it, without spaces and case. */
const fold = (name: string) => `regexp_replace(lower(${name}), '\\s+', '', 'g')`;

/**
 * Each names its columns as the answer does, and how close it is. $1 the collaboration, $2 how many,
 * $3 the folded words inside a pattern, $4 as they are, $5 at the beginning, $6 a number or null.
 */
const queries = [
  `select 'survey' as kind, id::text, name as title, band || ' band' as note,
     'surveys/' || slug as page, ${closeness(fold('name'))} as distance
   from survey where collaboration_id = $1
     and (${fold('name')} like $3 or slug like $3 or ${fold('description')} like $3)`,
  `select 'star' as kind, s.id::text, s.name as title,
     string_agg(distinct v.name, ', ') as note, 'stars/' || s.id as page,
     min(least(${closeness('s.folded_name')}, ${closeness('t.folded_name')},
       case when $4 in (s.gaia_dr3_id, t.gaia_dr3_id) then 0 else 2 end)) as distance
   from star s join target t on t.star_id = s.id join survey v on v.id = t.survey_id
   where s.collaboration_id = $1 and s.merged_into is null
     and (s.folded_name like $3 or t.folded_name like $3 or s.gaia_dr3_id like $5
       or t.gaia_dr3_id like $5
       or exists (select from unnest(t.other_names) other where ${fold('other')} like $3))
   group by s.id, s.name`,
  `select 'target' as kind, t.id::text, t.name as title, 'in ' || v.name as note,
     'surveys/' || v.slug || '?target=' || t.id as page, ${closeness('t.folded_name')} as distance
   from target t join survey v on v.id = t.survey_id
   where t.collaboration_id = $1
     and (t.folded_name like $3 or t.gaia_dr3_id like $5 or ${fold('t.moving_group')} like $3)`,
  `select 'population' as kind, id::text, name as title,
     'P-' || number || ', version ' || version as note, 'populations/P-' || number as page,
     case when number = $6::int then 0 else ${closeness(fold('name'))} end as distance
   from (select distinct on (number) * from population where collaboration_id = $1
         order by number, version desc) newest
   where ${fold('name')} like $3 or number = $6::int and $4 ~ '^(p-)?\\d+$'`,
  `select 'analysis' as kind, id::text, name as title, 'A-' || number as note,
     'analyses/A-' || number as page,
     case when number = $6::int then 0 else ${closeness(fold('name'))} end as distance
   from analysis where collaboration_id = $1
     and (${fold('name')} like $3 or number = $6::int and $4 ~ '^(a-)?\\d+$')`,
  `select 'run' as kind, r.id::text, 'Run ' || r.number || ' of A-' || a.number as title,
     a.name as note, 'analyses/A-' || a.number as page, 2 as distance
   from run r join analysis a on a.id = r.analysis_id
   where r.collaboration_id = $1
     and ('a-' || a.number || 'run' || r.number like $3
       or 'run' || r.number || 'ofa-' || a.number like $3 or r.id::text = $4)`,
  `select 'forecast' as kind, id::text, settings ->> 'name' as title, 'forecast' as note,
     'forecasts/' || id as page, ${closeness(fold("settings ->> 'name'"))} as distance
   from study where collaboration_id = $1 and kind = 'forecast'
     and ${fold("settings ->> 'name'")} like $3`,
  `select 'candidate' as kind, c.id::text, c.name as title,
     c.status || ', beside ' || t.name as note, 'candidates/' || c.id as page,
     ${closeness('c.folded_name')} as distance
   from companion c join target t on t.id = c.target_id
   where c.collaboration_id = $1 and (c.folded_name like $3 or t.folded_name like $3)`,
];

/**
 * Whatever of the collaboration carries these words in a name, or this number: a Gaia number from its
 * beginning on, A-31, P-4, "A-31 run 18".
 *
 * @returns at most five of a kind, the closest first; letters' case and spaces make no difference
 */
export async function search(actor: Actor, words: string): Promise<{ hits: SearchHit[] }> {
  demand(actor, 'read');
  const folded = foldName(words);
  const number = /^(?:[ap]-)?(\d{1,9})$/.exec(folded);
  const bind = [
    actor.collaborationId,
    MOST_OF_A_KIND,
    `%${literal(folded)}%`,
    folded,
    `${literal(folded)}%`,
    number ? Number(number[1]) : null,
  ];
  const parts = queries.map(
    (query) => `(select kind, id, title, note, page, distance
       from (${query}) found order by distance, length(title), title limit $2)`,
  );
  const rows = await together(`search ${actor.collaborationId} ${folded}`, () =>
    database().query<SearchHit & { distance: number }>(
      `${parts.join(' union all ')} order by distance`,
      { bind, type: QueryTypes.SELECT },
    ),
  );
  return { hits: rows.map(({ kind, id, title, note, page }) => ({ kind, id, title, note, page })) };
}
