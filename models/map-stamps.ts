import { QueryTypes } from 'sequelize';
import { database } from './index';

/**
 * Of everything that the maps of a survey rest on: its settings, targets, curves that hold, open
 * candidates, and values adopted for stars. Curves and cooling tables are only added and replaced.
 */
const STAMPS = `
  select v.id, md5(concat_ws(' ', v.map_settings,
    (select count(*) || ' ' || bit_xor(hashtextextended(t::text, 0))
      from target t where t.survey_id = v.id),
    (select count(*) || ' ' || bit_xor(hashtextextended(c.id::text, 0))
      from contrast_curve c join target t on t.id = c.target_id
      where t.survey_id = v.id and c.replaced_at is null),
    (select count(*) || ' ' || bit_xor(hashtextextended(k::text, 0))
      from companion k join target t on t.id = k.target_id where t.survey_id = v.id),
    (select count(*) || ' ' || max(n.number) from value_table n
      where n.collaboration_id = v.collaboration_id),
    (select bit_xor(hashtextextended(concat(root_of_star(a.star_id), a.table_id), 0))
      from adopted_value a where a.collaboration_id = v.collaboration_id))) as stamp
  from survey v where v.id = any($1::uuid[])`;

/**
 * A text for each survey that differs once anything has changed that its maps rest on.
 *
 * @param surveyIds of one or more collaborations
 */
export async function readMapStamps(surveyIds: string[]): Promise<Map<string, string>> {
  const rows = await database().query<{ id: string; stamp: string }>(STAMPS, {
    bind: [surveyIds],
    type: QueryTypes.SELECT,
  });
  return new Map(rows.map(({ id, stamp }) => [id, stamp]));
}
