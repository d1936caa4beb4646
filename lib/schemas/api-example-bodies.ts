import { team } from './api-route';

const SURVEYS = ['3f6c1f0a-5a0e-4c0e-9d52-0d6a4a7f8b11', '8d0b7c52-6f3e-4a55-8d6e-2b1f0c9e7a30'];
const RUN = '5b9a2f5e-14c1-4d0a-8a9d-7f30f1f0a6c2';

const flat = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 200,
  massIndex: 0,
  semiMajorAxisIndex: 0,
};
const email = 'ada@observatory.example';
const combined = { surveyIds: SURVEYS, rule: 'deepest' };

/** Bodies of examples whose point is optional, or that rules between fields govern. */
export const exampleBodies: Record<string, unknown> = {
  'post /api/v1/sign-up': { name: 'Ada Quill', email, password: 'a long phrase of your own' },
  'post /api/v1/account-links': { email, purpose: 'password-reset' },
  [`patch ${team}`]: { name: 'Harbour survey' },
  [`patch ${team}/settings`]: { credibleLevel: 0.95, timeZone: 'Europe/Vienna' },
  [`post ${team}/invitations`]: { email, roles: ['collaborator'] },
  [`post ${team}/surveys`]: { name: 'Plover', band: 'K' },
  [`patch ${team}/surveys/{survey}`]: { description: 'Young stars nearby' },
  [`patch ${team}/targets/{target}`]: { leftOutReason: 'A close binary' },
  [`post ${team}/surveys/{survey}/shares`]: {
    code: '4f0a-91c2-77be',
    scope: 'maps',
    attribution: 'The Plover survey',
  },
  [`post ${team}/combinations`]: { name: 'Both surveys', definition: combined },
  [`post ${team}/combinations/preview`]: { definition: combined },
  [`post ${team}/populations`]: {
    name: 'Flat in both logarithms',
    convention: 'log',
    definition: flat,
  },
  [`post ${team}/populations/{population}/versions`]: {
    convention: 'log',
    definition: { ...flat, massIndex: -0.5 },
    note: 'Fewer massive planets',
  },
  [`patch ${team}/analyses/{analysis}`]: { name: 'Plover alone' },
  [`post ${team}/analyses`]: {
    name: 'Plover alone',
    recipe: {
      surveyIds: [SURVEYS[0]],
      populationId: SURVEYS[1],
      likelihood: 'mean-number',
      prior: { law: 'uniform', max: 1 },
    },
  },
  [`post ${team}/guest-links`]: { label: 'The referee', days: 60, runId: RUN },
  [`patch ${team}/notes/{note}`]: { isResolved: true },
  [`patch ${team}/releases/{release}`]: { title: 'Few giant planets beyond 10 au' },
  [`patch ${team}/exercises/{exercise}`]: { title: 'Which prior, and why' },
};

/** Files of examples, where an address ends in one. */
export const exampleFiles: Record<string, string> = {
  [`${team}/runs/{run}/exports/{file}`]: 'limits.csv',
  [`${team}/surveys/{survey}/exports/{file}`]: 'targets.ecsv',
  [`${team}/samples/{sample}/exports/{file}`]: 'members.csv',
  [`${team}/stars/exports/{file}`]: 'stars.csv',
  [`${team}/populations/exports/{file}`]: 'populations.csv',
  [`${team}/maps/{map}/exports/{file}`]: 'maps.npy',
  '/api/v1/releases/{code}/files/{file}': 'bundle.zip',
};
