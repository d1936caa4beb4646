import { GET as listFiles } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import type { Actor } from '@/lib/access/actor';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { exportListSchema } from '@/lib/schemas/exports';
import { type ReleaseView, releaseSchema } from '@/lib/schemas/releases';
import { CoolingTableRow, type RunRow } from '@/models';
import { digestOf } from '@/models/digest';
import {
  actorOf,
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  tokenOf,
} from './people';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
  SMALL_GRID,
} from './sample';
import { askForMaps, runToEnd, untilEnded } from './work';

/** Two surveys that share a star, one with a cooling table; one detection, one open candidate. */
async function buildSurveys(collaboration: TestCollaboration, leadId: string) {
  const cooling = { massMjup: [1, 5, 20, 70], ageMyr: [10, 50, 300] };
  const magnitudes = { H: [16, 18, 21, 12, 14, 17, 9, 11, 13, 6, 8, 10] };
  const table = await CoolingTableRow.create({
    collaborationId: collaboration.id,
    name: 'Warm harbour',
    ...cooling,
    magnitudes,
    digest: digestOf({ ...cooling, magnitudes }),
  });
  const first = await buildSurvey(collaboration.id, { leadId, name: 'Curlew' });
  const other = await buildSurvey(collaboration.id, {
    leadId,
    name: 'Dunlin',
    mapSettings: { ...SMALL_GRID, cooling: { kind: 'table', coolingTableId: table.id } },
  });
  for (let i = 1; i <= 4; i++) {
    const target = await buildTarget(first, { name: `Star ${i}`, distancePc: 15 + 3 * i });
    if (i === 3) await buildCompanion(target);
    if (i === 4) await buildCompanion(target, { name: 'c', status: 'candidate' });
  }
  await buildTarget(other, { name: 'Star 1', distancePc: 18, curves: [{ nSigma: 4 }] });
  await buildTarget(other, { name: 'Star 9', curves: [{ coverage: [1, 1, 1, 0.9, 0.5, 0.1] }] });
  for (const survey of [first, other]) await untilEnded(await askForMaps(survey));
  const population = await buildPopulation(collaboration.id);
  return { surveys: [first, other], population };
}

interface Asked {
  role: Role;
  params?: Record<string, string>;
  body?: unknown;
  method?: string;
}

export interface ReleaseLab {
  team: TestCollaboration;
  /** At 95 % and at 90 %. */
  run: RunRow;
  second: RunRow;
  /** With the token of the team's member of that role. */
  ask(handler: RouteHandler, given: Asked): Promise<Response>;
  actor(role: Role): Promise<Actor>;
  /** What a run's files say of its standing. */
  stateOfFiles(run: string): Promise<string>;
}

/** A collaboration with one member of each role and two finished runs. Needs a worker that runs. */
export async function openReleaseLab(): Promise<ReleaseLab> {
  const roles = roleSchema.options;
  const { collaboration: team, people } = await createCollaborationWith(roles);
  const { surveys, population } = await buildSurveys(team, people.collaborator.id);
  const owner = await actorOf(people.owner, team);
  const runAt = async (credibleLevel: number) => {
    const recipe = { ...recipeOf(surveys, population), credibleLevel };
    const analysis = await buildAnalysis(team.id, recipe, owner.personId);
    const { run, job } = await runToEnd(owner, `A-${analysis.number}`);
    if (job.status !== 'done') throw new Error(`the run ended as ${job.status}: ${job.fault}`);
    return run;
  };
  const [run, second] = [await runAt(0.95), await runAt(0.9)];
  const tokens = new Map<Role, Record<string, string>>();
  for (const role of roles) tokens.set(role, bearer(await tokenOf(people[role], team)));
  const ask: ReleaseLab['ask'] = (handler, { role, params = {}, body, method }) =>
    call(handler, {
      method: method ?? (body === undefined ? 'GET' : 'POST'),
      headers: tokens.get(role),
      params: { collaboration: team.slug, ...params },
      body,
    });
  return {
    team,
    run,
    second,
    ask,
    actor: (role) => actorOf(people[role], team),
    stateOfFiles: async (id) => {
      const answer = await ask(listFiles, { role: 'student', params: { run: id } });
      return exportListSchema.parse(await answer.json()).state;
    },
  };
}

/** The release that a handler answered. @throws Error that shows any other answer */
export async function readRelease(response: Response): Promise<ReleaseView> {
  const text = await response.text();
  if (!response.ok) throw new Error(`${response.status}: ${text}`);
  return releaseSchema.parse(JSON.parse(text));
}
