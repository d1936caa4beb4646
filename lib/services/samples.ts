import { QueryTypes, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { InputError, NotFound } from '@/lib/errors';
import { refuseWithdrawn } from '@/lib/queue/withdrawn-surveys';
import { describeSample } from '@/lib/schemas/sample-words';
import {
  type createSampleSchema,
  type SampleDefinition,
  type SampleView,
  sampleDefinitionSchema,
} from '@/lib/schemas/samples';
import { database, inTransaction, SampleRow, SurveyRow } from '@/models';
import { digestOf } from '@/models/digest';
import { recordAudit } from './audit';

interface Fields {
  id: string;
  number: number;
  version: number;
  name: string;
  definition: SampleDefinition;
  digest: string;
  createdBy: string | null;
  createdAt: Date;
  /** Who made version 1 owns the sample. */
  beganById: string | null;
  isLatest: boolean;
  usedBy: string[];
}

async function readSamples(actor: Actor, transaction?: Transaction): Promise<SampleView[]> {
  const rows = await database().query<Fields>(
    `select s.id, s.number, s.version, s.name, s.definition, s.digest,
            p.name as "createdBy", s.created_at as "createdAt",
            first_value(s.created_by) over (partition by s.number order by s.version) as "beganById",
            s.version = max(s.version) over (partition by s.number) as "isLatest",
            coalesce((select array_agg('A-' || a.number order by a.number) from analysis a
                       where a.collaboration_id = s.collaboration_id
                         and a.recipe->>'sampleId' = s.id::text), '{}') as "usedBy"
       from sample s left join person p on p.id = s.created_by
      where s.collaboration_id = $1 order by s.number desc, s.version desc`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT, transaction },
  );
  const surveyName = await surveyNames(actor, transaction);
  return rows.map(({ beganById, ...row }) => {
    const definition = sampleDefinitionSchema.parse(row.definition);
    const isOwn = beganById === actor.personId;
    return {
      ...row,
      definition,
      key: `S-${row.number}`,
      words: describeSample(definition, surveyName),
      createdAt: row.createdAt.toISOString(),
      can: { saveVersion: row.isLatest && may(actor, 'save-sample', { isOwn }) },
    };
  });
}

/** Names of the collaboration's surveys by id, for words. */
export async function surveyNames(
  actor: Actor,
  transaction?: Transaction,
): Promise<(id: string) => string> {
  const rows = await SurveyRow.findAll({
    attributes: ['id', 'name'],
    where: { collaborationId: actor.collaborationId },
    transaction,
  });
  const names = new Map(rows.map(({ id, name }) => [id, name]));
  return (id) => names.get(id) ?? 'a deleted survey';
}

/** Every version of every sample, the newest first. */
export async function listSamples(actor: Actor): Promise<{ samples: SampleView[] }> {
  demand(actor, 'read');
  return { samples: await readSamples(actor) };
}

/** Refuses surveys that this collaboration does not have. */
export async function checkSurveys(
  actor: Actor,
  surveyIds: readonly string[],
  column: string,
  transaction?: Transaction,
): Promise<void> {
  if (new Set(surveyIds).size < surveyIds.length) {
    const [found, expected] = ['a survey twice', 'each survey once'];
    throw new InputError({ code: 'repeated', column, found, expected });
  }
  const where = { collaborationId: actor.collaborationId, id: [...surveyIds] };
  if ((await SurveyRow.count({ where, transaction })) < surveyIds.length) {
    throw new NotFound('survey');
  }
  await refuseWithdrawn(actor.collaborationId, surveyIds, transaction);
}

/** A new sample, version 1; with `versionOf`, a new version of that one. Versions never change. */
export async function createSample(
  actor: Actor,
  { name, definition, versionOf }: z.output<typeof createSampleSchema>,
): Promise<SampleView> {
  const { collaborationId, personId: createdBy } = actor;
  return inTransaction(async (transaction) => {
    // Numbers are given one after the other: whoever takes one holds the collaboration's row.
    await database().query('select id from collaboration where id = $1 for update', {
      bind: [collaborationId],
      transaction,
    });
    await checkSurveys(actor, definition.surveyIds ?? [], 'definition.surveyIds', transaction);
    const known = await readSamples(actor, transaction);
    const before = known.find(({ number }) => number === versionOf);
    if (versionOf !== undefined && !before) throw new NotFound('sample');
    demand(actor, 'save-sample', { isOwn: !before || before.can.saveVersion });
    const number = before?.number ?? Math.max(0, ...known.map((one) => one.number)) + 1;
    const version = (before?.version ?? 0) + 1;
    const digest = digestOf(definition);
    const row = await SampleRow.create(
      { collaborationId, number, version, name, definition, digest, createdBy },
      { transaction },
    );
    const key = `S-${number}`;
    const words = version === 1 ? `saved sample ${key}` : `saved version ${version} of ${key}`;
    const item = { kind: 'sample', id: key };
    await recordAudit(actor, 'save-sample', item, words, transaction, { version, digest });
    const saved = (await readSamples(actor, transaction)).find(({ id }) => id === row.id);
    if (!saved) throw new NotFound('sample');
    return saved;
  });
}
