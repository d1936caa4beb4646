import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { StarRow, TargetRow } from '@/models';
import { type KnownStars, noteJoined } from './known-stars';
import { inParts, type PlanContext } from './plan';
import { fieldsOf, type TargetFields, type TargetStep } from './target-fields';

interface Storing {
  context: PlanContext;
  known: KnownStars;
  steps: TargetStep[];
  uploadId: string;
}

/** Stars that the file brings, each with its new id. */
async function storeStars({ context, steps }: Storing, transaction: Transaction) {
  const { collaborationId } = context.survey;
  const idOf = new Map<TargetStep, string>();
  const rows = steps.flatMap((step) => {
    const { record, star, target } = step;
    if (star) return [];
    const id = randomUUID();
    idOf.set(step, id);
    const { foldedName } = fieldsOf(record, target);
    return [{ id, collaborationId, name: record.name, foldedName, gaiaDr3Id: record.gaiaDr3Id }];
  });
  await inParts(rows, (part) => StarRow.bulkCreate(part, { transaction }));
  return (step: TargetStep) => step.star?.id ?? (idOf.get(step) as string);
}

/** Writes the planned targets and the stars that are new with them. */
export async function storeTargets(storing: Storing, transaction: Transaction): Promise<void> {
  const { context, known, steps, uploadId } = storing;
  const { id: surveyId, collaborationId } = context.survey;
  const starIdOf = await storeStars(storing, transaction);
  for (const { star, record } of steps) {
    if (star && star.gaiaDr3Id === null && record.gaiaDr3Id && !known.ofGaia(record.gaiaDr3Id)) {
      await star.update({ gaiaDr3Id: record.gaiaDr3Id }, { transaction });
    }
  }
  const rows = steps.map((step) => {
    const { record, target, found } = step;
    const fields = { ...fieldsOf(record, target), uploadId };
    return {
      step,
      fields,
      row: {
        ...fields,
        id: target?.id ?? randomUUID(),
        collaborationId,
        surveyId,
        starId: target?.starId ?? starIdOf(step),
        starEvidence: target ? target.starEvidence : (found?.evidence ?? null),
      },
    };
  });
  const added = rows.filter(({ step }) => !step.target);
  await inParts(added, (part) =>
    TargetRow.bulkCreate(
      part.map(({ row }) => row),
      { transaction },
    ),
  );
  await inParts(
    rows.filter(({ step }) => step.target),
    (part) =>
      TargetRow.bulkCreate(
        part.map(({ row }) => row),
        { transaction, updateOnDuplicate: Object.keys(part[0].fields) as (keyof TargetFields)[] },
      ),
  );
  for (const { step, row } of added) {
    if (step.found?.through) await noteJoined(row.id, step.found.through, transaction);
  }
}
