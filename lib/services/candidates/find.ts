import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import { CompanionRow, SurveyRow, TargetRow } from '@/models';

export interface FoundCandidate {
  row: CompanionRow;
  target: TargetRow;
  survey: SurveyRow;
}

/** A candidate of this collaboration, or the same "no such candidate" for absent and foreign. */
export async function findCandidate(actor: Actor, id: string): Promise<FoundCandidate> {
  demand(actor, 'read');
  const row = idSchema.safeParse(id).success
    ? await CompanionRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  const target = row && (await TargetRow.findByPk(row.targetId));
  const survey = target && (await SurveyRow.findByPk(target.surveyId));
  if (!row || !target || !survey) throw new NotFound('candidate');
  return { row, target, survey };
}
