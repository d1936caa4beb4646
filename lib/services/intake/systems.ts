import type { Actor } from '@/lib/access/actor';
import type { Fault } from '@/lib/errors';
import type { SystemsRecord } from '@/lib/formats';
import { describePopulation } from '@/lib/inference';
import type { SystemsPopulation } from '@/lib/population';
import { PopulationRow } from '@/models';
import { digestOf } from '@/models/digest';
import { createPopulationIn } from '../populations';
import { countOf, type Plan } from './plan';

interface SystemsRequest {
  /** Name of the new population, or the file's own. */
  title: string;
  fileName: string;
  /** Number of the population of which the file is a new version. */
  versionOf: number | undefined;
}

/** Tabulated systems become a population, or a new version of one; the same table is stored once. */
export async function planSystems(
  actor: Actor,
  request: SystemsRequest,
  record: SystemsRecord,
): Promise<Plan> {
  const { collaborationId } = actor;
  const definition: SystemsPopulation = { form: 'systems', ...record };
  const { versionOf } = request;
  const known = await PopulationRow.findOne({
    attributes: ['number', 'version'],
    where: {
      collaborationId,
      digest: digestOf(definition),
      ...(versionOf !== undefined && { number: versionOf }),
    },
    order: [
      ['number', 'ASC'],
      ['version', 'ASC'],
    ],
  });
  const words = describePopulation(definition);
  const faults: Fault[] = [];
  if (versionOf !== undefined && !known) faults.push(...(await unknownNumber(actor, versionOf)));
  const summary = known ? `${words}, as P-${known.number} version ${known.version}` : words;
  return {
    items: [{ name: request.title, outcome: known ? 'unchanged' : 'new', summary }],
    faults,
    notes: [],
    summary: `Population of ${countOf(record.weight.length, 'system')} with ${countOf(record.companionSystem.length, 'companion')}`,
    needsMaps: false,
    apply: async (transaction) => {
      if (known) return;
      await createPopulationIn(
        actor,
        {
          name: request.title,
          note: `From the file ${request.fileName}`,
          convention: 'log',
          definition,
          isShared: false,
          ...(versionOf !== undefined && { versionOf }),
        },
        transaction,
      );
    },
  };
}

async function unknownNumber(actor: Actor, number: number): Promise<Fault[]> {
  const where = { collaborationId: actor.collaborationId, number };
  if ((await PopulationRow.count({ where })) > 0) return [];
  return [
    {
      code: 'choice-unknown',
      item: 'versionOf',
      found: `P-${number}`,
      expected: 'the number of a population of this collaboration',
    },
  ];
}
