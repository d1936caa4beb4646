import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { InputError } from '@/lib/errors';
import { enqueueMaps } from '@/lib/queue/enqueue';
import type { CandidateDetail, GiveVerdict } from '@/lib/schemas/candidates';
import {
  type CompanionRow,
  CompanionVerdictRow,
  ContrastCurveRow,
  inTransaction,
  type SurveyRow,
  type TargetRow,
} from '@/models';
import { recordAudit } from '../audit';
import { refuseShared } from '../sharing/shared-surveys';
import { isLead } from '../surveys';
import { isOpen } from './describe';
import { getCandidate } from './detail';
import { findCandidate } from './find';
import { withAdopted } from './host';
import { keptValues, newAxis, newMass, type Values } from './verdict-values';

const DEFAULT_PROBABILITY: Partial<Record<CompanionRow['status'], number>> = {
  confirmed: 1,
  background: 0,
};

/** Words of the log: "took HIP 1 b for a companion". */
const TAKEN_FOR: Record<CompanionRow['status'], string> = {
  confirmed: 'a companion',
  candidate: 'a candidate',
  ambiguous: 'ambiguous',
  background: 'background',
};

function refuseUnplaced({ status }: GiveVerdict, values: Values): void {
  if (status !== 'confirmed') return;
  if (values.massMjup !== null && values.semiMajorAxisAu !== null) return;
  const missing = values.massMjup === null ? 'mass' : 'semi-major axis';
  throw new InputError({
    code: 'no-companion-mass',
    column: values.massMjup === null ? 'mass' : 'semiMajorAxis',
    message: `A companion counts by its mass and semi-major axis, and this one has no ${missing}: give one, or take it from what was measured`,
  });
}

/** Where candidates cut the curves, the map of a star follows what is decided of its candidates. */
async function renewMap(
  actor: Actor,
  survey: SurveyRow,
  target: TargetRow,
  transaction: Transaction,
): Promise<void> {
  const curves = await ContrastCurveRow.count({
    where: { targetId: target.id, replacedAt: null },
    transaction,
  });
  if (survey.mapSettings.candidates !== 'cut' || curves === 0) return;
  await enqueueMaps(transaction, {
    collaborationId: actor.collaborationId,
    surveyId: survey.id,
    requestedBy: actor.personId,
    targetIds: [target.id],
  });
  await target.update({ mapState: 'waiting', mapFault: null }, { transaction });
}

/**
 * Decides about a candidate, or proposes it: one more row of its history. A decision becomes what
 * the candidate is; a proposal waits for the lead of the survey.
 */
export async function giveVerdict(
  actor: Actor,
  id: string,
  input: GiveVerdict,
): Promise<CandidateDetail> {
  const found = await findCandidate(actor, id);
  const { row, target, survey } = found;
  if (input.isProposal) demand(actor, 'write-note');
  else demand(actor, 'vet', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  const { found: hosted } = await withAdopted(found);
  const [mass, axis] = await Promise.all([newMass(hosted, input), newAxis(hosted, input)]);
  await inTransaction(async (transaction) => {
    await row.reload({ transaction, lock: transaction.LOCK.UPDATE });
    const decided = { companionId: row.id, isProposal: false };
    const order = [['number', 'DESC'] as [string, string]];
    const last = await CompanionVerdictRow.findOne({ where: decided, order, transaction });
    const values: Values = { ...keptValues(row, last), ...mass, ...axis };
    refuseUnplaced(input, values);
    const { status, reason, isProposal } = input;
    const probability = input.probability ?? DEFAULT_PROBABILITY[status] ?? null;
    const where = { companionId: row.id };
    const newest = await CompanionVerdictRow.max<number, CompanionVerdictRow>('number', {
      where,
      transaction,
    });
    const number = (newest ?? 0) + 1;
    await CompanionVerdictRow.create(
      {
        ...{ ...values, ...where, number, status, probability, reason, isProposal },
        collaborationId: row.collaborationId,
        createdBy: actor.personId,
      },
      { transaction },
    );
    if (!isProposal) {
      const wasOpen = isOpen(row);
      const { massFrom, semiMajorAxisFrom, ...measured } = values;
      await row.update({ ...measured, status, probability }, { transaction });
      if (wasOpen !== isOpen(row)) await renewMap(actor, survey, target, transaction);
    }
    const verb = isProposal ? 'proposed to take' : 'took';
    const summary = `${verb} ${target.name} ${row.name} for ${TAKEN_FOR[status]}`;
    await recordAudit(actor, 'vet', { kind: 'candidate', id }, summary, transaction, {
      reason,
      status,
      probability,
      isProposal: isProposal === true,
    });
  });
  return getCandidate(actor, id);
}
