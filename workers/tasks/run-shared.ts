import type { Transaction } from 'sequelize';
import type { RunInputs } from '@/lib/schemas/runs';
import { ShareRow, type SurveyRow } from '@/models';

/** The surveys of a run that other collaborations share, each with its attribution and version. */
export async function describeShared(
  surveys: readonly { row: SurveyRow }[],
  transaction: Transaction,
): Promise<NonNullable<RunInputs['shared']>> {
  const ids = surveys.flatMap(({ row }) => row.shareId ?? []);
  if (ids.length === 0) return [];
  const shares = await ShareRow.findAll({ where: { id: ids }, transaction });
  return surveys.flatMap(({ row }) => {
    const share = shares.find(({ id }) => id === row.shareId);
    if (!share) return [];
    const { ownerName: owner, scope, attribution, sourceVersion } = share;
    return [
      {
        surveyId: row.id,
        survey: row.name,
        owner,
        scope,
        attribution,
        version: sourceVersion ?? '',
      },
    ];
  });
}
