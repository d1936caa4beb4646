import { foldName } from '@/lib/formats';
import { type SurveyRow, TargetRow } from '@/models';
import { UPLOAD_WITHDRAWN } from './changes';
import type { Plan } from './plan';

/** Targets that a withdrawn file had brought count again once another file lists them. */
export async function takeBackWithdrawn(plan: Plan, survey: SurveyRow): Promise<Plan> {
  const withdrawn = await TargetRow.findAll({
    attributes: ['id', 'foldedName'],
    where: { surveyId: survey.id, leftOutReason: UPLOAD_WITHDRAWN },
  });
  const listed = new Set(plan.items.map(({ name }) => foldName(name)));
  const back = withdrawn.filter(({ foldedName }) => listed.has(foldedName));
  if (back.length === 0) return plan;
  const names = new Set(back.map(({ foldedName }) => foldedName));
  return {
    ...plan,
    items: plan.items.map((item) =>
      names.has(foldName(item.name))
        ? { ...item, outcome: 'replaces', summary: `${item.summary}; counts again` }
        : item,
    ),
    apply: async (transaction, uploadId) => {
      await plan.apply(transaction, uploadId);
      await TargetRow.update(
        { leftOutReason: null, uploadId },
        { where: { id: back.map(({ id }) => id) }, transaction },
      );
    },
  };
}
