import type { Actor } from '@/lib/access/actor';
import type { Fault } from '@/lib/errors';
import type { CoolingTableRecord } from '@/lib/formats';
import { CoolingTableRow } from '@/models';
import { canonicalJson, sha256Hex } from '@/models/digest';
import type { Plan } from './plan';

/** A cooling table is named once and never changed; another state of it gets another name. */
export async function planCoolingTable(
  actor: Actor,
  title: string,
  record: CoolingTableRecord,
): Promise<Plan> {
  const { massMjup, ageMyr, magnitudes } = record;
  const digest = sha256Hex(canonicalJson({ massMjup, ageMyr, magnitudes }));
  const known = await CoolingTableRow.findOne({
    where: { collaborationId: actor.collaborationId, name: title },
  });
  const isSame = known?.digest === digest;
  const faults: Fault[] = [];
  if (known && !isSame) {
    faults.push({
      code: 'name-duplicate',
      item: 'title',
      found: `"${title}", under which another cooling table is stored`,
      expected: 'a name that is still free',
    });
  }
  const bands = Object.keys(magnitudes);
  return {
    items: [
      {
        name: title,
        outcome: isSame ? 'unchanged' : 'new',
        summary: `${massMjup.length} masses × ${ageMyr.length} ages, bands ${bands.join(', ')}`,
      },
    ],
    faults,
    notes: [],
    summary: `Cooling table with ${massMjup.length} masses, ${ageMyr.length} ages and the bands ${bands.join(', ')}`,
    needsMaps: false,
    apply: async (transaction, uploadId) => {
      if (isSame) return;
      await CoolingTableRow.create(
        {
          collaborationId: actor.collaborationId,
          uploadId,
          name: title,
          massMjup,
          ageMyr,
          magnitudes,
          digest,
        },
        { transaction },
      );
    },
  };
}
