import { randomBytes } from 'node:crypto';
import type { Actor } from '@/lib/access/actor';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { beginFile } from '@/lib/services/unfinished-files';
import { CoolingTableRow, database, type RunRow, type SurveyRow } from '@/models';
import { buildKeptMaps, buildMap, buildRun, buildUpload, insert, secret } from './lab-rows';
import {
  addMember,
  createCollaborationWith,
  createPerson,
  type TestCollaboration,
  type TestPerson,
} from './people';
import { publishRelease } from './published-release';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from './sample';

/** What stands between braces in an address, and what else bodies and questions name. */
export type LabIds = Record<string, string>;

export interface WholeLab {
  collaboration: TestCollaboration;
  people: Record<Role | 'lead', TestPerson>;
  ids: LabIds;
}

async function buildSky(team: TestCollaboration, leadId: string, name: string) {
  const survey = await buildSurvey(team.id, { name, leadId });
  const second = await buildSurvey(team.id, { leadId });
  const target = await buildTarget(survey, { name: 'First star' });
  const other = await buildTarget(survey, { name: 'Second star' });
  const pair = [target.starId, other.starId].sort();
  return {
    survey,
    second,
    target,
    map: await buildMap(team.id, target),
    pair: await insert('star_match', {
      collaboration_id: team.id,
      first_star_id: pair[0],
      second_star_id: pair[1],
      state: 'proposed',
      evidence: '{"reasons": []}',
    }),
    companion: await buildCompanion(target, { status: 'candidate', probability: 0.5 }),
  };
}

async function beginUnfinished(collaborationId: string, personId: string): Promise<string> {
  const actor = { collaborationId, personId } as Actor;
  return (await beginFile(actor, 23)).id;
}

interface Made {
  team: TestCollaboration;
  people: WholeLab['people'];
  survey: SurveyRow;
}

async function buildWork({ team, people, survey }: Made, offset: number, map: string) {
  const { id: collaborationId } = team;
  const { id: personId } = people.owner;
  const population = await buildPopulation(collaborationId);
  await population.update({ number: offset, createdBy: personId, isShared: false });
  const recipe = recipeOf([survey], population);
  const analysis = await buildAnalysis(collaborationId, recipe, personId);
  await analysis.update({ number: offset });
  // A draft without a run, which may be deleted.
  const draft = await buildAnalysis(collaborationId, recipe, personId);
  await draft.update({ number: offset + 1 });
  const run = await buildRun(collaborationId, analysis, { personId, map });
  const jobId = await insert('job', {
    collaboration_id: collaborationId,
    kind: 'compute-study',
    status: 'waiting',
    requested_by: personId,
  });
  const study = await insert('study', {
    collaboration_id: collaborationId,
    run_id: run.id,
    number: 1,
    job_id: jobId,
    kind: 'free-indices',
    settings: '{"kind": "free-indices"}',
    settings_digest: secret(),
    seed: '0',
    engine_version: '1',
    created_by: personId,
  });
  const keptMaps = await buildKeptMaps(run, map);
  return { population, analysis, draft, run, study, keptMaps, job: jobId };
}

async function buildTeaching({ team, people }: Made, run: RunRow, offset: number, by: string) {
  const collaboration_id = team.id;
  const exercise = await insert('exercise', {
    collaboration_id,
    number: offset,
    title: 'Which prior',
    task: 'Say why.',
    may_change: ['prior'],
    is_shared: true,
    run_id: run.id,
    created_by: people.owner.id,
  });
  const start = await insert('exercise_start', {
    collaboration_id,
    exercise_id: exercise,
    person_id: by,
    analysis_id: run.analysisId,
  });
  return insert('exercise_submission', {
    collaboration_id,
    start_id: start,
    number: 1,
    run_id: run.id,
  });
}

async function buildPeopleThings({ team, people, survey }: Made, personId: string) {
  const collaboration_id = team.id;
  const ends = { expires_at: new Date(Date.now() + 86_400_000) };
  return {
    invitation: await insert('invitation', {
      collaboration_id,
      email: `${randomBytes(6).toString('hex')}@observatory.example`,
      roles: ['student'],
      code_hash: secret(),
      ...ends,
    }),
    token: await insert('access_token', {
      collaboration_id,
      person_id: personId,
      name: 'to be revoked',
      scopes: ['read'],
      token_hash: secret(),
      ending: 'wxyz',
      ...ends,
    }),
    note: await insert('note', {
      collaboration_id,
      survey_id: survey.id,
      body: 'Which ages?',
      created_by: personId,
    }),
    mapping: await insert('column_memory', {
      collaboration_id,
      survey_id: survey.id,
      kind: 'targets',
      headings: ['name'],
      headings_digest: secret(),
      column_map: '{}',
    }),
    message: await insert('outbox_message', {
      collaboration_id,
      person_id: people.student.id,
      kind: 'invitation',
      to_address: people.student.email,
      state: 'failed',
      sealed: Buffer.from('x'),
      ended_at: new Date(),
    }),
  };
}

async function buildGivenThings({ team, survey }: Made, other: TestCollaboration) {
  const release = await publishRelease(team, {
    ...{ publishedAt: null, publishedByName: null, signedOffAt: null, signedOffByName: null },
    ...{ agreedAt: null, agreedByName: null, verification: null },
  });
  const share = {
    scope: 'whole',
    survey_name: 'Dunlin',
    attribution: 'Somebody',
    expires_at: new Date(Date.now() + 86_400_000),
  };
  return {
    release,
    link: await insert('guest_link', {
      collaboration_id: team.id,
      release_id: release.id,
      label: 'The referee',
      token_hash: secret(),
      token_ending: 'abcd',
      expires_at: share.expires_at,
    }),
    given: await insert('share', {
      ...share,
      collaboration_id: team.id,
      survey_id: survey.id,
      receiver_id: other.id,
      owner_name: team.name,
    }),
    received: await insert('share', {
      ...share,
      collaboration_id: other.id,
      survey_id: (await buildSurvey(other.id)).id,
      receiver_id: team.id,
      owner_name: other.name,
    }),
  };
}

/**
 * A collaboration with a person of each role, a collaborator who leads its survey, and one of
 * everything that has an address of its own; the owner made what has a maker.
 *
 * @param offset the number of its analysis, population and so on, so that two can be told apart
 * @param removes whose token, note, exercise and unfinished file are there
 */
export async function buildWholeLab(
  offset: number,
  removes: Role | 'lead' = 'owner',
): Promise<WholeLab> {
  const keys = [...roleSchema.options, 'collaborator+student'] as const;
  const { collaboration: team, people: made } = await createCollaborationWith(keys);
  const { 'collaborator+student': lead, ...rest } = made;
  const people = { ...rest, lead };
  const other = (await createCollaborationWith(['owner'])).collaboration;
  const name = `Plover ${offset}`;
  const sky = await buildSky(team, lead.id, name);
  const things = { team, people, survey: sky.survey };
  const work = await buildWork(things, offset, sky.map);
  const submission = await buildTeaching(things, work.run, offset, people[removes].id);
  const own = await buildPeopleThings(things, people[removes].id);
  const shared = await buildGivenThings(things, other);
  const { id: collaborationId } = team;
  const magnitudes = { H: [16, 18, 12, 14] };
  const cooling = { massMjup: [1, 70], ageMyr: [10, 300], magnitudes };
  const table = await CoolingTableRow.create({
    ...{ collaborationId, name: 'Warm harbour', digest: secret() },
    ...cooling,
  });
  const observation = await insert('companion_observation', {
    collaboration_id: collaborationId,
    companion_id: sky.companion.id,
    observed_on: '2026-01-01',
    separation_arcsec: 1,
    position_angle_deg: 10,
  });
  const guest = await createPerson();
  const code = randomBytes(6).toString('hex');
  await database().query('update collaboration set sharing_code = $1 where id = $2', {
    bind: [code, other.id],
  });
  const exportJob = await insert('job', {
    ...{ collaboration_id: collaborationId, kind: 'export-collaboration', status: 'done' },
  });
  const packed = await insert('collaboration_export', {
    ...{ collaboration_id: collaborationId, job_id: exportJob, asked_by_name: 'R. Castellan' },
    ...{ finished_at: new Date(), byte_length: 4, sha256: secret() },
    expires_at: new Date(Date.now() + 86_400_000),
  });
  await insert('collaboration_export_part', {
    ...{ export_id: packed, collaboration_id: collaborationId },
    ...{ part_number: 0, bytes: Buffer.from('zip.') },
  });
  const sample = { collaboration_id: collaborationId, number: offset, version: 1 };
  return {
    collaboration: team,
    people,
    ids: {
      survey: sky.survey.slug,
      surveyId: sky.survey.id,
      secondId: sky.second.id,
      target: sky.target.id,
      star: sky.target.starId,
      map: sky.map,
      pair: sky.pair,
      candidate: sky.companion.id,
      observation,
      analysis: `A-${offset}`,
      draft: `A-${offset + 1}`,
      population: `P-${offset}`,
      populationId: work.population.id,
      run: work.run.id,
      study: work.study,
      keptMaps: work.keptMaps,
      job: work.job,
      exercise: `E-${offset}`,
      submission,
      ...own,
      member: await addMember(team, guest, ['student']),
      personId: guest.id,
      code,
      release: `R-${shared.release.number}`,
      releaseId: shared.release.id,
      link: shared.link,
      given: shared.given,
      share: shared.received,
      table: table.id,
      upload: await buildUpload(sky.survey.id, collaborationId, 'read'),
      stored: await buildUpload(sky.survey.id, collaborationId, 'stored'),
      export: packed,
      sample: await insert('sample', {
        ...{ ...sample, name: 'All', definition: '{}', digest: secret() },
      }),
      file: 'table.csv',
      unfinished: await beginUnfinished(collaborationId, people[removes].id),
    },
  };
}
