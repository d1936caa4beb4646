import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import type { Role } from '@/lib/schemas/common';
import type { FirstStep } from '@/lib/schemas/first-steps';
import { database } from '@/models';

/** What there is by now, as far as a first step asks for it. */
interface Existing {
  people: number;
  surveys: number;
  targets: number;
  maps: number;
  populations: number;
  ownAnalyses: number;
  ownRuns: number;
  ownZeroRuns: number;
  studies: number;
  sharedExercises: number;
  ownSubmissions: number;
}

const COUNTS = `select
  (select count(*) from member where collaboration_id = $1)::int as people,
  (select count(*) from survey where collaboration_id = $1)::int as surveys,
  (select count(*) from target where collaboration_id = $1)::int as targets,
  (select count(*) from target where collaboration_id = $1 and map_state = 'ready')::int as maps,
  (select count(*) from population where collaboration_id = $1)::int as populations,
  (select count(*) from analysis where collaboration_id = $1 and created_by = $2)::int
    as "ownAnalyses",
  (select count(*) from run where collaboration_id = $1 and created_by = $2
    and result is not null)::int as "ownRuns",
  (select count(*) from run where collaboration_id = $1 and created_by = $2
    and result is not null and recipe->>'detections' = 'none')::int as "ownZeroRuns",
  (select count(*) from study where collaboration_id = $1 and created_by = $2
    and result is not null)::int as studies,
  (select count(*) from exercise where collaboration_id = $1 and is_shared)::int
    as "sharedExercises",
  (select count(*) from exercise_submission h join exercise_start s on s.id = h.start_id
    where h.collaboration_id = $1 and s.person_id = $2)::int as "ownSubmissions"`;

type Steps = (there: Existing) => FirstStep[];

const step = (title: string, detail: string, path: string, isDone: boolean): FirstStep => ({
  title,
  detail,
  path,
  isDone,
});

const addSurvey = ({ surveys }: Existing) =>
  step(
    'Add a survey',
    'A name, a band, the years it observed; you lead it.',
    '/surveys/new',
    surveys > 0,
  );

const bringTargets = ({ targets }: Existing) =>
  step(
    'Bring its targets',
    'One file: name, distance and age, each with its error. Every line is checked before anything is stored.',
    '/surveys',
    targets > 0,
  );

const bringCurves = ({ maps }: Existing) =>
  step(
    'Bring its contrast curves, or ready maps',
    'Completeness maps are computed from curves by themselves.',
    '/surveys',
    maps > 0,
  );

const makeAnalysis = ({ ownAnalyses }: Existing) =>
  step(
    'Begin an analysis',
    'Surveys, population, prior: the estimate stands there before the first run.',
    '/analyses/new',
    ownAnalyses > 0,
  );

const runIt = ({ ownRuns }: Existing) =>
  step(
    'Run it',
    'A run keeps everything that it used and never changes.',
    '/analyses',
    ownRuns > 0,
  );

/** In the order of what an empty collaboration needs first. */
const stepsOf: Record<Role, Steps> = {
  owner: (there) => [
    step(
      'Invite the others',
      'Say what each may do; an invitation is valid for 14 days.',
      '/people',
      there.people > 1,
    ),
    addSurvey(there),
    bringTargets(there),
  ],
  collaborator: (there) => [addSurvey(there), bringTargets(there), bringCurves(there)],
  statistician: (there) => [
    step(
      'Write down a population',
      'Which planets are asked about: ranges and slopes, each with its prior.',
      '/populations/new',
      there.populations > 0,
    ),
    makeAnalysis(there),
    runIt(there),
  ],
  author: (there) => [
    makeAnalysis(there),
    runIt(there),
    step(
      'Ask what it rests on',
      'What would move the limit most, and which stars carry it.',
      '/analyses',
      there.studies > 0,
    ),
  ],
  student: (there) => [
    step(
      'Copy an analysis',
      'A draft of your own: nothing that anybody else made can break.',
      '/analyses',
      there.ownAnalyses > 0,
    ),
    step(
      'Set its detections aside and run it',
      'Compare the two: that is what the detections do.',
      '/analyses',
      there.ownZeroRuns > 0,
    ),
    there.sharedExercises > 0
      ? step(
          'Hand in an exercise',
          'A run with a remark; whoever set it answers.',
          '/exercises',
          there.ownSubmissions > 0,
        )
      : step(
          'Ask a further question of your run',
          'Which stars carry its limit, and what would move it.',
          '/analyses',
          there.studies > 0,
        ),
  ],
};

const ORDER: readonly Role[] = ['owner', 'collaborator', 'statistician', 'author', 'student'];

/**
 * The first three steps of a person's role, each done or not by what exists now: nothing is ticked
 * by hand and nothing is stored.
 */
export async function getFirstSteps(actor: Actor): Promise<FirstStep[]> {
  demand(actor, 'read');
  const role = ORDER.find((one) => actor.roles.includes(one));
  if (role === undefined) return [];
  const [there] = await database().query<Existing>(COUNTS, {
    bind: [actor.collaborationId, actor.personId],
    type: QueryTypes.SELECT,
  });
  return stepsOf[role](there);
}
