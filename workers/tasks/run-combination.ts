import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { describeStoredCombination } from '@/lib/schemas/combination-words';
import {
  type CombinationDefinition,
  combinationDefinitionSchema,
} from '@/lib/schemas/combinations';
import type { RunInputs } from '@/lib/schemas/runs';
import { CombinationRow, SurveyRow } from '@/models';

/** A stored combination as a run follows and states it. */
export interface StoredCombination {
  definition: CombinationDefinition;
  words: NonNullable<RunInputs['storedCombination']>;
}

/**
 * The combination that a recipe names; null where it names none.
 *
 * @throws InputError when it is not there any more
 */
export async function loadCombination(
  collaborationId: string,
  { combinationId: id }: Pick<AnalysisRecipe, 'combinationId'>,
  transaction: Transaction,
): Promise<StoredCombination | null> {
  if (id === undefined) return null;
  const row = await CombinationRow.findOne({ where: { id, collaborationId }, transaction });
  if (!row) {
    throw new InputError({
      code: 'no-combination',
      message: 'The combination that the analysis names is not there any more; choose another',
    });
  }
  const definition = combinationDefinitionSchema.parse(row.definition);
  const surveys = await SurveyRow.findAll({
    attributes: ['id', 'name'],
    where: { collaborationId, id: definition.surveyIds },
    transaction,
  });
  const { number, version, name, digest } = row;
  return combinationOf({ id, number, version, name, digest, definition }, surveys);
}

/** A stored combination in words. */
export function combinationOf(
  row: Pick<CombinationRow, 'id' | 'number' | 'version' | 'name' | 'digest' | 'definition'>,
  surveys: readonly { id: string; name: string }[],
): StoredCombination {
  const { id, number, version, name, digest, definition } = row;
  const names = new Map(surveys.map((survey) => [survey.id, survey.name]));
  const nameOf = (surveyId: string) => names.get(surveyId) ?? 'a deleted survey';
  const words = describeStoredCombination(definition, nameOf);
  return { definition, words: { id, key: `C-${number}`, version, name, words, digest } };
}
