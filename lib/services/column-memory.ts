import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import type { ColumnMapping } from '@/lib/schemas/uploads';
import { ColumnMemoryRow, inTransaction, PersonRow, type SurveyRow } from '@/models';
import { canonicalJson, sha256Hex } from '@/models/digest';
import { recordAudit } from './audit';
import { refuseShared } from './sharing/shared-surveys';
import { findSurvey, isLead } from './surveys';

interface ReadColumn {
  heading: string;
}

/** The headings of a file as a set: their order and how often a file comes do not matter. */
const headingsOf = (columns: ReadColumn[]) =>
  [...new Set(columns.map(({ heading }) => heading.trim()).filter(Boolean))].sort();
const digestOf = (headings: string[]) => sha256Hex(canonicalJson(headings));

/** The mapping with which a file of this kind and these headings was stored last. */
export async function recallMapping(
  survey: SurveyRow | null,
  kind: string,
  columns: ReadColumn[],
): Promise<{ id: string; columnMap: Record<string, string> } | null> {
  const headings = headingsOf(columns);
  if (!survey || headings.length === 0) return null;
  const row = await ColumnMemoryRow.findOne({
    where: { surveyId: survey.id, kind, headingsDigest: digestOf(headings) },
  });
  return row && { id: row.id, columnMap: row.columnMap };
}

/** Keeps the mapping of a file that is being stored, for the next one with the same headings. */
export async function keepMapping(
  actor: Actor,
  survey: SurveyRow,
  file: { kind: string; columns: ReadColumn[]; columnMap: Record<string, string> | undefined },
  transaction: Transaction,
): Promise<void> {
  const headings = headingsOf(file.columns);
  const columnMap = Object.fromEntries(
    Object.entries(file.columnMap ?? {}).filter(([heading]) => headings.includes(heading.trim())),
  );
  if (Object.keys(columnMap).length === 0) return;
  const place = { surveyId: survey.id, kind: file.kind, headingsDigest: digestOf(headings) };
  const kept = { columnMap, keptBy: actor.personId, keptAt: new Date() };
  const [row, isNew] = await ColumnMemoryRow.findOrCreate({
    where: place,
    defaults: { ...place, ...kept, collaborationId: survey.collaborationId, headings },
    transaction,
  });
  if (!isNew) await row.update(kept, { transaction });
}

/** Every mapping that is remembered for a survey, newest first. */
export async function listMappings(actor: Actor, slug: string): Promise<ColumnMapping[]> {
  const survey = await findSurvey(actor, slug);
  const rows = await ColumnMemoryRow.findAll({
    where: { surveyId: survey.id },
    order: [['keptAt', 'DESC']],
  });
  const people = await PersonRow.findAll({
    where: { id: rows.flatMap((row) => row.keptBy ?? []) },
  });
  const nameOf = new Map(people.map(({ id, name }) => [id, name]));
  return rows.map((row) => ({
    id: row.id,
    kind: row.kind as ColumnMapping['kind'],
    headings: row.headings,
    columnMap: row.columnMap,
    keptBy: nameOf.get(row.keptBy ?? '') ?? null,
    keptAt: row.keptAt.toISOString(),
  }));
}

/** The next file with those headings is read by its own names again. */
export async function forgetMapping(actor: Actor, slug: string, id: string): Promise<void> {
  const survey = await findSurvey(actor, slug);
  demand(actor, 'import', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  const isId = idSchema.safeParse(id).success;
  await inTransaction(async (transaction) => {
    const where = { id, surveyId: survey.id };
    const gone = isId ? await ColumnMemoryRow.destroy({ where, transaction }) : 0;
    if (gone === 0) throw new NotFound('column mapping');
    const item = { kind: 'survey', id: survey.id };
    const summary = `let a way to read columns of ${survey.name} be forgotten`;
    await recordAudit(actor, 'forget-columns', item, summary, transaction);
  });
}
