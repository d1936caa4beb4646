import { QueryTypes, type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { Conflict } from '@/lib/errors';
import { enqueueMaps, holdMaps } from '@/lib/queue/enqueue';
import type { UploadDependents, UploadView } from '@/lib/schemas/uploads';
import { database, inTransaction, type SurveyRow, TargetRow, UploadRow } from '@/models';
import { recordAudit } from './audit';
import { applyWithdrawal, planWithdrawal, type Withdrawal } from './intake/withdrawal';
import { demandImport, describeUpload, findUpload } from './uploads';

const namesShown = 12;
const someOf = (names: string[]) => ({ count: names.length, names: names.slice(0, namesShown) });

async function runsThatUsed(
  { storedAt }: UploadRow,
  survey: SurveyRow,
  starIds: string[],
): Promise<UploadDependents['runs']> {
  const rows = await database().query<UploadDependents['runs'][number] & { finishedAt: Date }>(
    `select a.number as analysis, a.name, r.number as run, r.finished_at as "finishedAt"
     from run r join analysis a on a.id = r.analysis_id join job j on j.id = r.job_id
     where r.collaboration_id = $1 and r.result is not null and j.started_at >= $2
       and exists (select 1 from run_star s where s.run_id = r.id
         and $3 = any(s.survey_ids) and s.star_id = any($4::uuid[]))
     order by a.number, r.number`,
    {
      bind: [survey.collaborationId, storedAt, survey.id, starIds],
      type: QueryTypes.SELECT,
    },
  );
  return rows.map((row) => ({ ...row, finishedAt: new Date(row.finishedAt).toISOString() }));
}

async function describeDependents(
  row: UploadRow,
  survey: SurveyRow,
  plan: Withdrawal,
): Promise<UploadDependents> {
  const targets = await TargetRow.findAll({
    attributes: ['starId'],
    where: { id: [...plan.targetIds] },
  });
  return {
    targetsLeftOut: someOf(plan.words.leftOut),
    goBack: someOf(plan.words.goBack),
    end: someOf(plan.words.end),
    stay: someOf(plan.words.stay),
    runs: await runsThatUsed(
      row,
      survey,
      targets.map(({ starId }) => starId),
    ),
  };
}

async function findStored(actor: Actor, id: string) {
  const { row, survey } = await findUpload(actor, id);
  if (!survey) {
    throw new Conflict('Only the files of a survey can be withdrawn; this one belongs to none');
  }
  if (row.state !== 'stored') {
    const words = row.state === 'read' ? 'is not stored' : 'was withdrawn already';
    throw new Conflict(`This file ${words}`);
  }
  return { row, survey };
}

/** What a stored file carries: what would end or go back with it, and the runs that used it. */
export async function getDependents(actor: Actor, id: string): Promise<UploadDependents> {
  const { row, survey } = await findStored(actor, id);
  const plan = await inTransaction((transaction) => planWithdrawal(row, survey, transaction));
  return describeDependents(row, survey, plan);
}

/**
 * Takes a file back: what it brought counts no longer for new runs, what it replaced stands again.
 * Runs that used it stay as they are and are marked as made with older inputs.
 */
export async function withdrawUpload(actor: Actor, id: string): Promise<UploadView> {
  const { row, survey } = await findStored(actor, id);
  demandImport(actor, row, survey);
  try {
    await inTransaction((transaction) => withdraw(actor, row, survey, transaction));
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Conflict('What stood before this file has names that other rows have taken since');
  }
  await row.reload();
  return describeUpload(row);
}

async function withdraw(
  actor: Actor,
  row: UploadRow,
  survey: SurveyRow,
  transaction: Transaction,
): Promise<void> {
  await holdMaps(transaction, survey.id);
  const plan = await planWithdrawal(row, survey, transaction);
  const [claimed] = await UploadRow.update(
    { state: 'withdrawn', withdrawnAt: new Date(), withdrawnBy: actor.personId },
    { where: { id: row.id, state: 'stored' }, transaction },
  );
  if (claimed === 0) throw new Conflict('This file was withdrawn already');
  const needsMaps = await applyWithdrawal(plan, actor.personId, transaction);
  if (needsMaps) {
    await enqueueMaps(transaction, {
      collaborationId: actor.collaborationId,
      surveyId: survey.id,
      requestedBy: actor.personId,
    });
  }
  await recordAudit(
    actor,
    'import',
    { kind: 'upload', id: row.id },
    `withdrew ${row.fileName}: ${describeWords(plan)}`,
    transaction,
  );
}

function describeWords({ words }: Withdrawal): string {
  const parts = [
    [words.leftOut.length, 'left out'],
    [words.goBack.length, 'back to what stood before'],
    [words.end.length, 'ended'],
  ] as const;
  const told = parts.filter(([count]) => count > 0).map(([count, word]) => `${count} ${word}`);
  return told.join(', ') || 'nothing changes';
}
