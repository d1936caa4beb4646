import { CompanionObservationRow, CompanionRow, SurveyRow, TargetRow } from '@/models';
import { applyAdopted, loadAdopted } from '@/models/adopted-values';
import { notWithdrawn } from '../sharing/archived';
import type { FoundCandidate } from './find';

/**
 * The candidate with the age and distance that were adopted for its star in the place of its
 * survey's own; the copy of the target is for reading and never stored.
 */
export async function withAdopted(
  found: FoundCandidate,
): Promise<{ found: FoundCandidate; adopted: string[] }> {
  const { target } = found;
  const values = await loadAdopted(target.collaborationId);
  const copy = TargetRow.build(target.get({ plain: true }), { raw: true, isNewRecord: false });
  applyAdopted(copy, values);
  const adopted = (['age', 'distance'] as const).flatMap((quantity) => {
    const held = values[quantity].get(target.starId);
    return held ? [`${quantity} of ${quantity}s table ${held.table}, ${held.source}`] : [];
  });
  return { found: { ...found, target: copy }, adopted };
}

/** An epoch of a companion that another survey lists under the same name beside the same star. */
export interface JoinedEpoch {
  row: CompanionObservationRow;
  survey: string;
}

/** Epochs that other surveys have of this companion: one star and one name is one companion. */
export async function epochsElsewhere({ row, target }: FoundCandidate): Promise<JoinedEpoch[]> {
  const { collaborationId, starId } = target;
  const others = await TargetRow.findAll({
    where: { collaborationId, starId },
    include: [{ model: SurveyRow, as: 'survey', required: true, where: notWithdrawn() }],
  });
  const surveyOf = new Map(
    others
      .filter(({ id }) => id !== target.id)
      .map((other) => [other.id, (other as TargetRow & { survey: SurveyRow }).survey.name]),
  );
  const companions = await CompanionRow.findAll({
    where: { targetId: [...surveyOf.keys()], foldedName: row.foldedName },
  });
  const nameOf = new Map(companions.map(({ id, targetId }) => [id, surveyOf.get(targetId) ?? '']));
  const rows = await CompanionObservationRow.findAll({
    where: { companionId: [...nameOf.keys()] },
  });
  return rows.map((one) => ({ row: one, survey: nameOf.get(one.companionId) ?? '' }));
}
