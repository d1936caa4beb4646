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
  const { number, version, name, digest } = row;
  return selectionOf({ id, number, version, name, digest, definition }, surveys);
}

/** A stored selection in words. */
export function selectionOf(
  row: Pick<SampleRow, 'id' | 'number' | 'version' | 'name' | 'digest' | 'definition'>,
  surveys: readonly { id: string; name: string }[],
): Selection {
  const { id, number, version, name, digest, definition } = row;
  const names = new Map(surveys.map((survey) => [survey.id, survey.name]));
  const words = describeSample(definition, (surveyId) => names.get(surveyId) ?? 'a deleted survey');
  return { definition, words: { id, key: `S-${number}`, version, name, words, digest } };
}
