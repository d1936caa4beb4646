import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import type { RunInputs } from '@/lib/schemas/runs';
import { describeSample } from '@/lib/schemas/sample-words';
import { type SampleDefinition, sampleDefinitionSchema } from '@/lib/schemas/samples';
import { SampleRow, SurveyRow } from '@/models';

/** A selection of stars as a run applies and states it. */
export interface Selection {
  definition: SampleDefinition;
  words: NonNullable<RunInputs['sample']>;
}

/**
 * The selection that a recipe names.
 *
 * @throws InputError when it is not there any more
 */
export async function loadSelection(
  collaborationId: string,
  id: string,
  transaction: Transaction,
): Promise<Selection> {
  const row = await SampleRow.findOne({ where: { id, collaborationId }, transaction });
  if (!row) {
    throw new InputError({
      code: 'no-sample',
      message: 'The sample that the analysis names is not there any more; choose another',
    });
  }
  const definition = sampleDefinitionSchema.parse(row.definition);
  const surveys = await SurveyRow.findAll({
    attributes: ['id', 'name'],
    where: { collaborationId, id: definition.surveyIds ?? [] },
    transaction,
  });
  const names = new Map(surveys.map((survey) => [survey.id, survey.name]));
  const words = describeSample(definition, (surveyId) => names.get(surveyId) ?? 'a deleted survey');
  const { number, version, name, digest } = row;
  return { definition, words: { id, key: `S-${number}`, version, name, words, digest } };
}
