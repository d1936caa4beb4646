import { afterAll, beforeAll, expect, it } from 'vitest';
import type { SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith } from '../support/people';
import {
  buildAnalysis,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();

beforeAll(async () => {
  await startWorker({ threads: 1 });
});
afterAll(killWorkers);

it.each(['default', 'deepest'] as const)(
  'a survey that was copied leaves the limit as it was, rule "%s"',
  async (combination) => {
    const { collaboration, people } = await createCollaborationWith(['owner']);
    const owner = await actorOf(people.owner, collaboration);
    const surveys: SurveyRow[] = [];
    for (const name of ['First', 'Copy']) {
      const survey = await buildSurvey(collaboration.id, { name });
      for (let i = 1; i <= 3; i++) await buildTarget(survey, { name: `Star ${i}` });
      expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
      surveys.push(survey);
    }
    const population = await buildPopulation(collaboration.id);
    const answerOf = async (chosen: SurveyRow[]) => {
      const recipe = recipeOf(chosen, population, { combination });
      const { number } = await buildAnalysis(collaboration.id, recipe, owner.personId);
      const { result } = (await runToEnd(owner, `A-${number}`)).run;
      return [result?.stars, result?.entries, result?.answer.limit];
    };
    const [stars, entries, limit] = await answerOf(surveys.slice(0, 1));
    expect([stars, entries]).toEqual([3, 3]);
    expect(limit).toBeGreaterThan(0);
    expect(await answerOf(surveys)).toEqual([3, 6, limit]);
  },
);
