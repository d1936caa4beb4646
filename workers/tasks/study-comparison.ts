import { InputError } from '@/lib/errors';
import { PopulationRow } from '@/models';
import type { ComparedInput } from '../answers/population-comparison';
import type { StudyPerformer } from './study-context';
import { hostMassesUnder } from './study-hosts';

const namedInput = (row: PopulationRow): ComparedInput => ({
  populationId: row.id,
  key: `P-${row.number}`,
  version: row.version,
  name: row.name,
  population: row.definition,
});

/** The run's own population beside others, with the same data and prior of the rate. */
export const performComparison: StudyPerformer<'population-comparison'> = async (
  given,
  settings,
) => {
  const { collaborationId, run, question } = given;
  const own = run.recipe.populationId;
  const others = [...new Set(settings.populationIds)].filter((id) => id !== own);
  const found = await PopulationRow.findAll({
    where: { collaborationId, id: [own, ...others] },
  });
  const rowOf = new Map(found.map((row) => [row.id, row]));
  const rows = [own, ...others].map((id) => {
    const row = rowOf.get(id);
    if (row) return row;
    throw new InputError({
      code: 'choice-unknown',
      message: 'A population of this question is not there any more; ask with others',
    });
  });
  for (const { number, version, digest } of rows) {
    given.further.push({ what: `population P-${number} version ${version}`, digest });
  }
  const hostMassMsun = await hostMassesUnder(
    given,
    rows.map(({ definition }) => definition),
  );
  await given.report('populations', 0, 1);
  const compared = await given.compute('population-comparison', {
    question: { ...question, hostMassMsun },
    populations: rows.map(namedInput),
  });
  await given.report('populations', 1, 1);
  return { kind: 'population-comparison', ...compared };
};
