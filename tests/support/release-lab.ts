import { CoolingTableRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { TestCollaboration } from './people';
import { buildCompanion, buildPopulation, buildSurvey, buildTarget, SMALL_GRID } from './sample';
import { askForMaps, untilEnded } from './work';

/** Two surveys that share a star, one with a cooling table; one detection, one open candidate. */
export async function buildReleaseLab(collaboration: TestCollaboration, leadId: string) {
  const cooling = { massMjup: [1, 5, 20, 70], ageMyr: [10, 50, 300] };
  const magnitudes = { H: [16, 18, 21, 12, 14, 17, 9, 11, 13, 6, 8, 10] };
  const table = await CoolingTableRow.create({
    collaborationId: collaboration.id,
    name: 'Warm harbour',
    ...cooling,
    magnitudes,
    digest: digestOf({ ...cooling, magnitudes }),
  });
  const first = await buildSurvey(collaboration.id, { leadId, name: 'Curlew' });
  const other = await buildSurvey(collaboration.id, {
    leadId,
    name: 'Dunlin',
    mapSettings: { ...SMALL_GRID, cooling: { kind: 'table', coolingTableId: table.id } },
  });
  for (let i = 1; i <= 4; i++) {
    const target = await buildTarget(first, { name: `Star ${i}`, distancePc: 15 + 3 * i });
    if (i === 3) await buildCompanion(target);
    if (i === 4) await buildCompanion(target, { name: 'c', status: 'candidate' });
  }
  await buildTarget(other, { name: 'Star 1', distancePc: 18, curves: [{ nSigma: 4 }] });
  await buildTarget(other, { name: 'Star 9', curves: [{ coverage: [1, 1, 1, 0.9, 0.5, 0.1] }] });
  for (const survey of [first, other]) await untilEnded(await askForMaps(survey));
  const population = await buildPopulation(collaboration.id);
  return { surveys: [first, other], population };
}
