import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { StatedLimit } from '@/lib/schemas/exercises';
import { database, PopulationRow } from '@/models';
import type { WordedRecipe } from './exercise-words';

/** A finished run as exercises show it. */
export interface ExerciseRun extends WordedRecipe {
  id: string;
  number: number;
  analysisId: string;
  analysis: string;
  analysisName: string;
  stated: StatedLimit;
}

interface Row {
  id: string;
  number: number;
  analysisId: string;
  analysisNumber: number;
  analysisName: string;
  recipe: AnalysisRecipe;
  quantity: StatedLimit['quantity'];
  credibleLevel: number;
  limit: number;
  isConstrained: boolean;
  sentence: string;
  conditions: string[];
}

/** Finished runs of this collaboration with recipe, population and limit, without their large parts. */
export async function readExerciseRuns(
  actor: Actor,
  by: { runIds: string[] } | { analysisIds: string[] },
  transaction?: Transaction,
): Promise<ExerciseRun[]> {
  const [column, ids] = 'runIds' in by ? ['r.id', by.runIds] : ['r.analysis_id', by.analysisIds];
  if (ids.length === 0) return [];
  const rows = await database().query<Row>(
    `select r.id, r.number, a.id as "analysisId", a.number as "analysisNumber",
       a.name as "analysisName", r.recipe, x.quantity, x."credibleLevel",
       (x.answer->>'limit')::float8 as "limit",
       (x.answer->>'isConstrained')::boolean as "isConstrained",
       x.statement->>'sentence' as sentence, x.statement->'conditions' as conditions
     from run r join analysis a on a.id = r.analysis_id
       cross join lateral jsonb_to_record(r.result) as x(
         quantity text, "credibleLevel" float8, answer jsonb, statement jsonb)
     where r.collaboration_id = $1 and ${column} = any($2::uuid[]) and r.result is not null
     order by r.number desc`,
    { bind: [actor.collaborationId, ids], type: QueryTypes.SELECT, transaction },
  );
  const populations = await PopulationRow.findAll({
    where: {
      collaborationId: actor.collaborationId,
      id: [...new Set(rows.map(({ recipe }) => recipe.populationId))],
    },
    transaction,
  });
  return rows.map(({ id, number, analysisId, analysisNumber, analysisName, recipe, ...stated }) => {
    const population = populations.find((one) => one.id === recipe.populationId);
    if (!population) throw new NotFound('population');
    return {
      id,
      number,
      analysisId,
      analysis: `A-${analysisNumber}`,
      analysisName,
      recipe,
      population: population.definition,
      stated,
    };
  });
}
