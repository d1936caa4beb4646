import type { MapSettings } from '@/lib/schemas/surveys';
import { BUILT_IN_LAW_NAME, type CoolingRelation } from '@/lib/sensitivity';
import { CoolingTableRow } from '@/models';

/** The cooling relation of a survey's maps; null where its table is gone. */
export async function readCooling(
  collaborationId: string,
  { cooling }: Pick<MapSettings, 'cooling'>,
): Promise<{ relation: CoolingRelation; name: string } | null> {
  if (cooling.kind === 'built-in') {
    return { relation: { kind: 'built-in' }, name: BUILT_IN_LAW_NAME };
  }
  const row = await CoolingTableRow.findOne({
    where: { id: cooling.coolingTableId, collaborationId },
  });
  if (!row) return null;
  const magnitudes = Object.fromEntries(
    Object.entries(row.magnitudes).map(([band, values]) => [
      band,
      Float64Array.from(values, (value) => value ?? Number.NaN),
    ]),
  );
  const table = {
    name: row.name,
    massMjup: Float64Array.from(row.massMjup),
    ageMyr: Float64Array.from(row.ageMyr),
    magnitudes,
  };
  return { relation: { kind: 'table', table }, name: row.name };
}
