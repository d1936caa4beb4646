import { QueryTypes, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { describeStoredCombination } from '@/lib/schemas/combination-words';
import {
  type CombinationDefinition,
  type CombinationView,
  combinationDefinitionSchema,
  type createCombinationSchema,
} from '@/lib/schemas/combinations';
import { CombinationRow, database, inTransaction, StarRow } from '@/models';
import { digestOf } from '@/models/digest';
import { recordAudit } from './audit';
import { checkSurveys, surveyNames } from './samples';

type Fields = Omit<CombinationView, 'key' | 'words' | 'createdAt'> & { createdAt: Date };

async function readCombinations(
  actor: Actor,
  transaction?: Transaction,
): Promise<CombinationView[]> {
  const rows = await database().query<Fields>(
    `select c.id, c.number, c.version, c.name, c.definition, c.digest,
            p.name as "createdBy", c.created_at as "createdAt",
            c.version = max(c.version) over (partition by c.number) as "isLatest",
            coalesce((select array_agg('A-' || a.number order by a.number) from analysis a
                       where a.collaboration_id = c.collaboration_id
                         and a.recipe->>'combinationId' = c.id::text), '{}') as "usedBy"
       from combination c left join person p on p.id = c.created_by
      where c.collaboration_id = $1 order by c.number desc, c.version desc`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT, transaction },
  );
  const surveyName = await surveyNames(actor, transaction);
  return rows.map((row) => {
    const definition = combinationDefinitionSchema.parse(row.definition);
    return {
      ...row,
      definition,
      key: `C-${row.number}`,
      words: describeStoredCombination(definition, surveyName),
      createdAt: row.createdAt.toISOString(),
    };
  });
}

/** Every version of every combination, the newest first. */
export async function listCombinations(actor: Actor): Promise<{ combinations: CombinationView[] }> {
  demand(actor, 'read');
  return { combinations: await readCombinations(actor) };
}

/** Refuses surveys and stars that this collaboration does not have. */
export async function checkCombination(
  actor: Actor,
  { surveyIds, starRules }: CombinationDefinition,
  transaction?: Transaction,
): Promise<void> {
  await checkSurveys(actor, surveyIds, 'definition.surveyIds', transaction);
  const ids = starRules.map(({ starId }) => starId);
  const where = { collaborationId: actor.collaborationId, id: ids };
  if ((await StarRow.count({ where, transaction })) < ids.length) throw new NotFound('star');
}

/** A new combination, version 1; with `versionOf`, a new version of that one. */
export async function createCombination(
  actor: Actor,
  { name, definition, versionOf }: z.output<typeof createCombinationSchema>,
): Promise<CombinationView> {
  demand(actor, 'combine');
  const { collaborationId, personId: createdBy } = actor;
  return inTransaction(async (transaction) => {
    // Numbers are given one after the other: whoever takes one holds the collaboration's row.
    await database().query('select id from collaboration where id = $1 for update', {
      bind: [collaborationId],
      transaction,
    });
    await checkCombination(actor, definition, transaction);
    const known = await readCombinations(actor, transaction);
    const before = known.find(({ number }) => number === versionOf);
    if (versionOf !== undefined && !before) throw new NotFound('combination');
    const number = before?.number ?? Math.max(0, ...known.map((one) => one.number)) + 1;
    const version = (before?.version ?? 0) + 1;
    const digest = digestOf(definition);
    const row = await CombinationRow.create(
      { collaborationId, number, version, name, definition, digest, createdBy },
      { transaction },
    );
    const key = `C-${number}`;
    const words = version === 1 ? `saved ${key}` : `saved version ${version} of ${key}`;
    const item = { kind: 'combination', id: key };
    await recordAudit(actor, 'combine', item, words, transaction, { version, digest });
    const saved = (await readCombinations(actor, transaction)).find(({ id }) => id === row.id);
    if (!saved) throw new NotFound('combination');
    return saved;
  });
}
