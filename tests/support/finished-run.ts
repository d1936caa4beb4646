import type { Actor } from '@/lib/access/actor';
import type { Role } from '@/lib/schemas/common';
import type { AnalysisRow, RunRow, SurveyRow } from '@/models';
import {
  actorOf,
  createCollaborationWith,
  type TestCollaboration,
  type TestPerson,
} from './people';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from './sample';
import { askForMaps, runToEnd, untilEnded } from './work';

export interface FinishedLab {
  collaboration: TestCollaboration;
  people: Record<Role, TestPerson>;
  owner: Actor;
  survey: SurveyRow;
  analysis: AnalysisRow;
  key: string;
  run: RunRow;
}

const ROLES: readonly Role[] = ['owner', 'statistician', 'collaborator', 'author', 'student'];

/**
 * A collaboration with one member of each role and an analysis that a real worker has run: eight
 * stars, one detection inside the ranges. Needs a worker that is running.
 */
export async function buildFinishedLab(): Promise<FinishedLab> {
  const { collaboration, people } = await createCollaborationWith(ROLES);
  const owner = await actorOf(people.owner, collaboration);
  const survey = await buildSurvey(collaboration.id, { leadId: people.collaborator.id });
  for (let i = 1; i <= 8; i++) {
    const target = await buildTarget(survey, { name: `Star ${i}`, distancePc: 15 + 3 * i });
    if (i === 3) await buildCompanion(target);
  }
  const maps = await untilEnded(await askForMaps(survey));
  if (maps.status !== 'done') throw new Error(`the maps ended as ${maps.status}: ${maps.fault}`);
  const population = await buildPopulation(collaboration.id);
  const recipe = recipeOf([survey], population);
  const analysis = await buildAnalysis(collaboration.id, recipe, owner.personId);
  const key = `A-${analysis.number}`;
  const { run, job } = await runToEnd(owner, key);
  if (job.status !== 'done') throw new Error(`the run ended as ${job.status}: ${job.fault}`);
  return { collaboration, people, owner, survey, analysis, key, run };
}
