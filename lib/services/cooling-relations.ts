import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { idSchema } from '@/lib/schemas/common';
import type { CoolingRelationView, StartCondition } from '@/lib/schemas/cooling';
import {
  BUILT_IN_LAW_BANDS,
  BUILT_IN_LAW_NAME,
  BUILT_IN_LAW_RANGE,
  BUILT_IN_LAW_SOURCE,
  builtInMagnitude,
} from '@/lib/sensitivity';
import { CoolingTableRow, database, inTransaction } from '@/models';
import { recordAudit } from './audit';

const BUILT_IN = 'built-in';
const LAW_MASSES = [1, 2, 3, 5, 8, 12, 20, 30, 50, 75];
const LAW_AGES = 33;

async function findTable(actor: Actor, id: string): Promise<CoolingTableRow> {
  const isId = idSchema.safeParse(id).success;
  const where = { id, collaborationId: actor.collaborationId };
  const row = isId ? await CoolingTableRow.findOne({ where }) : null;
  if (!row) throw new NotFound('cooling table');
  return row;
}

interface UseRow {
  slug: string;
  name: string;
  targets: number;
  outside: CoolingRelationView['usedBy'][number]['outside'];
}

/** The surveys that use a relation, and their targets whose ages reach beyond it. */
function readUse(actor: Actor, id: string, [ageMin, ageMax]: [number, number]): Promise<UseRow[]> {
  return database().query<UseRow>(
    `select s.slug, s.name, count(t.id)::int as targets,
       coalesce(jsonb_agg(jsonb_build_object('name', t.name, 'lowerMyr', age.low, 'upperMyr', age.high)
         order by t.name) filter (where age.low < $3 or age.high > $4), '[]') as outside
     from survey s left join target t on t.survey_id = s.id and t.left_out_reason is null
       and exists (select 1 from contrast_curve c where c.target_id = t.id and c.replaced_at is null)
     left join lateral (select
       coalesce(t.age_lower_myr, t.age_min_myr, t.age_myr) as low,
       coalesce(t.age_upper_myr, t.age_max_myr, t.age_myr) as high) age on true
     where s.collaboration_id = $1 and (s.archived_at is null or s.archived_at > now())
       and coalesce(s.map_settings->'cooling'->>'coolingTableId', $5) = $2
     group by s.id order by s.position`,
    {
      bind: [actor.collaborationId, id, ageMin, ageMax, BUILT_IN],
      type: QueryTypes.SELECT,
    },
  );
}

async function describeBuiltIn(actor: Actor): Promise<CoolingRelationView> {
  const { ageMinMyr, ageMaxMyr } = BUILT_IN_LAW_RANGE;
  const ageMyr = [...logSpacedAxis(ageMinMyr, ageMaxMyr, LAW_AGES)];
  // The ends of the axis may miss those of the law by a bit.
  const inside = ageMyr.map((age) => Math.min(ageMaxMyr, Math.max(ageMinMyr, age)));
  const magnitudesIn = (band: string) =>
    LAW_MASSES.flatMap((mass) =>
      inside.map((age) => {
        const magnitude = builtInMagnitude(mass, age, band);
        return Number.isFinite(magnitude) ? magnitude : null;
      }),
    );
  return {
    id: BUILT_IN,
    name: BUILT_IN_LAW_NAME,
    startCondition: 'hot',
    isApproximate: true,
    source: BUILT_IN_LAW_SOURCE,
    massMjup: LAW_MASSES,
    ageMyr: inside,
    magnitudes: Object.fromEntries(BUILT_IN_LAW_BANDS.map((band) => [band, magnitudesIn(band)])),
    usedBy: await readUse(actor, BUILT_IN, [ageMinMyr, ageMaxMyr]),
  };
}

/** A cooling relation with its numbers, and the surveys that use it. */
export async function getCoolingRelation(actor: Actor, id: string): Promise<CoolingRelationView> {
  demand(actor, 'read');
  if (id === BUILT_IN) return describeBuiltIn(actor);
  const row = await findTable(actor, id);
  const { massMjup, ageMyr } = row;
  return {
    id: row.id,
    name: row.name,
    startCondition: row.startCondition,
    isApproximate: false,
    source: null,
    massMjup,
    ageMyr,
    magnitudes: row.magnitudes,
    usedBy: await readUse(actor, row.id, [ageMyr[0], ageMyr[ageMyr.length - 1]]),
  };
}

/** Names what a table starts from; its numbers stay as they are. */
export async function nameStart(
  actor: Actor,
  id: string,
  { startCondition }: { startCondition: StartCondition },
): Promise<CoolingRelationView> {
  const row = await findTable(actor, id);
  demand(actor, 'import-cooling-table');
  await inTransaction(async (transaction) => {
    await row.update({ startCondition }, { transaction });
    const item = { kind: 'cooling-table', id: row.id };
    const words = `named the start of ${row.name}: ${startCondition}`;
    await recordAudit(actor, 'import-cooling-table', item, words, transaction);
  });
  return getCoolingRelation(actor, id);
}
