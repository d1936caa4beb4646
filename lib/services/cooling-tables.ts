import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import type { CoolingTableView, SurveyView } from '@/lib/schemas/surveys';
import { CoolingTableRow } from '@/models';

/** Cooling tables of the collaboration, by name. */
export async function listCoolingTables(actor: Actor): Promise<CoolingTableView[]> {
  demand(actor, 'read');
  const rows = await CoolingTableRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [['name', 'ASC']],
  });
  return rows.map((row) => ({
    id: row.id,
    name: row.name,
    bands: Object.keys(row.magnitudes),
    massMjup: row.massMjup,
    ageMyr: row.ageMyr,
    startCondition: row.startCondition,
    digest: row.digest,
    createdAt: row.createdAt.toISOString(),
  }));
}

/** Name of the table with which a survey's curves become maps; null for the built-in law. */
export async function nameCooling(
  actor: Actor,
  { mapSettings: { cooling } }: Pick<SurveyView, 'mapSettings'>,
): Promise<string | null> {
  demand(actor, 'read');
  if (cooling.kind === 'built-in') return null;
  const row = await CoolingTableRow.findOne({
    attributes: ['name'],
    where: { collaborationId: actor.collaborationId, id: cooling.coolingTableId },
  });
  return row?.name ?? null;
}
