import type { Action } from '@/lib/access/permissions';
import type { LabIds } from './whole-lab';

/** Whose the thing is: led by the lead, made by the owner, or by whoever asks. */
export type Whose = 'lead' | 'maker' | 'own';

export interface RoutePermission {
  action: Action;
  whose?: Whose;
  /** Ids in the address that are not the lab's usual ones. */
  ids?: (ids: LabIds) => LabIds;
  body?: (ids: LabIds) => unknown;
  query?: (ids: LabIds) => Record<string, string>;
  headers?: Record<string, string>;
  /** What is sent as it is, where the route takes a file. */
  file?: { type: string; text: string };
}

const as =
  (action: Action, whose?: Whose) =>
  (given: Omit<RoutePermission, 'action' | 'whose'> = {}): RoutePermission => ({
    action,
    whose,
    ...given,
  });

const read = as('read');
const invite = as('invite');
const manage = as('manage-collaboration');
const changeRoles = as('change-roles');
const importing = as('import', 'lead');
const vet = as('vet', 'lead');
const combine = as('combine');
const runIts = as('run-analysis', 'maker');
const setExercise = as('make-exercise');
const freeze = as('freeze-run');
const accept = as('accept-survey');

const why = { body: () => ({ why: 'They said so' }) };
const upload = { file: { type: 'application/octet-stream', text: 'name,distance_pc\nA,12\n' } };
const part = { file: { type: 'application/offset+octet-stream', text: 'name' } };
const csv = (file: string) => ({ ids: (ids: LabIds) => ({ ...ids, file }) });
const definition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 200,
  massIndex: 0,
  semiMajorAxisIndex: 0,
};
const population = { convention: 'log', definition };
const choice = ({ target }: LabIds) => ({ kind: 'entry', targetId: target });
const combined = ({ surveyId, secondId }: LabIds) => ({
  surveyIds: [secondId, surveyId],
  rule: 'deepest',
});
const recipe = ({ surveyId, populationId }: LabIds) => ({
  surveyIds: [surveyId],
  populationId,
  likelihood: 'mean-number',
  prior: { law: 'uniform', max: 1 },
});
const figure =
  '<svg xmlns="http://www.w3.org/2000/svg" width="180mm" viewBox="0 0 884 400"><title>A</title></svg>';
const onSurvey = ({ survey }: LabIds) => ({ kind: 'survey', key: survey });

/** Each route within a collaboration, with its row of the permission table; without `~`'s prefix. */
export const routePermissions: Record<string, RoutePermission> = {
  'get ': read(),
  'patch ': manage({ body: () => ({ name: 'Another name' }) }),
  'get /members': read(),
  'get /members/{member}': read(),
  'patch /members/{member}': changeRoles({ body: () => ({ roles: ['student'] }) }),
  'post /members/{member}/suspension': changeRoles({ body: () => ({ isSuspended: true }) }),
  'delete /members/{member}': changeRoles(),
  'get /invitations': invite(),
  'post /invitations': invite({
    body: () => ({ email: 'a@b.example', roles: ['student'] }),
  }),
  'delete /invitations/{invitation}': invite(),
  'post /invitations/{invitation}/resend': invite(),
  'get /tokens': as('create-token')(),
  'post /tokens': as('create-token')({ body: () => ({ name: 'a script', scopes: ['read'] }) }),
  'delete /tokens/{token}': as('create-token')(),
  'get /audit': as('read-audit')({ query: ({ survey }) => ({ item: survey }) }),
  'get /audit/export': as('read-audit')(),
  'get /overview': read(),
  'get /surveys': read(),
  'post /surveys': as('create-survey')({ body: () => ({ name: 'Dunlin', band: 'K' }) }),
  'get /surveys/{survey}': read(),
  'patch /surveys/{survey}': as('change-survey', 'lead')({ body: () => ({ description: 'x' }) }),
  'get /surveys/{survey}/targets': read(),
  'get /surveys/{survey}/companions': read(),
  'get /surveys/{survey}/maps': read(),
  'post /surveys/{survey}/maps': importing(),
  'get /targets/{target}': read(),
  'patch /targets/{target}': as(
    'change-survey',
    'lead',
  )({ body: () => ({ leftOutReason: 'A close binary' }) }),
  'get /maps/{map}': read(),
  'get /uploads': read({ query: ({ survey }) => ({ survey }) }),
  'post /uploads': importing({
    ...upload,
    query: ({ survey }) => ({ kind: 'targets', survey, name: 'a.csv' }),
  }),
  'post /unfinished-files': importing({
    ...part,
    query: ({ survey }) => ({ kind: 'targets', survey }),
    headers: { 'upload-length': '23' },
  }),
  // Whoever began a file, and nobody else.
  'get /unfinished-files/{unfinished}': read(),
  'patch /unfinished-files/{unfinished}': read({ ...part, headers: { 'upload-offset': '0' } }),
  'delete /unfinished-files/{unfinished}': read(),
  'get /uploads/{upload}': read(),
  'patch /uploads/{upload}': importing({ body: () => ({}) }),
  'post /uploads/{upload}/store': importing(),
  'get /uploads/{upload}/dependents': read({
    ids: (ids) => ({ ...ids, upload: ids.stored }),
  }),
  'post /uploads/{upload}/withdraw': importing({
    ids: (ids) => ({ ...ids, upload: ids.stored }),
  }),
  'get /surveys/{survey}/column-mappings': read(),
  'delete /surveys/{survey}/column-mappings/{mapping}': importing(),
  'get /uploads/{upload}/file': read(),
  'get /cooling-tables': read(),
  'get /runs/{run}/freeze': read(),
  'post /runs/{run}/freeze': freeze({ body: () => ({ reason: 'No candidates yet' }) }),
  'get /runs/{run}/bundle': read(),
  'get /releases': read(),
  'post /releases': freeze({
    body: ({ run }) => ({ title: 'Rare', authors: [{ name: 'R. Castellan' }], runIds: [run] }),
  }),
  'get /releases/{release}': read(),
  'patch /releases/{release}': freeze({ body: () => ({ title: 'Rarer' }) }),
  'delete /releases/{release}': freeze(),
  'post /releases/{release}/sign-off': as('sign-off-release')(),
  'post /releases/{release}/agree': as('agree-release')(),
  'post /releases/{release}/check': as('agree-release')(),
  'post /releases/{release}/publish': as('agree-release')(),
  'post /releases/{release}/withdraw': as('withdraw-release')({
    body: () => ({ reason: 'A star was counted twice' }),
  }),
  'get /guest-links': read(),
  'post /guest-links': as('link-guest')({
    body: ({ run }) => ({ label: 'The referee', runId: run }),
  }),
  'delete /guest-links/{link}': as('link-guest')(),
  'get /bundles': read(),
  'post /bundles': as('create-survey')(upload),
  'get /releases/{release}/deposit': read(),
  'post /releases/{release}/deposit': as('deposit-release')(),
  'get /leaving': manage(),
  'post /leaving/exports': manage(),
  'get /leaving/exports/{export}': manage(),
  'post /leaving/deletion': manage({ body: () => ({ name: 'not its name' }) }),
  'delete /leaving/deletion': manage(),
  'get /samples': read(),
  'post /samples': as('save-sample', 'own')({ body: () => ({ name: 'All', definition: {} }) }),
  'post /samples/preview': read({
    body: ({ surveyId }) => ({ definition: { surveyIds: [surveyId] } }),
  }),
  'get /cooling-tables/{table}': read(),
  'patch /cooling-tables/{table}': as('import-cooling-table')({
    body: () => ({ startCondition: 'hot' }),
  }),
  'get /maps': read(),
  'get /combinations': read(),
  'post /combinations': combine({
    body: (ids) => ({ name: 'Both', definition: combined(ids) }),
  }),
  'post /combinations/preview': read({ body: (ids) => ({ definition: combined(ids) }) }),
  'get /search': read({ query: () => ({ q: 'star' }) }),
  'get /populations': read(),
  'post /populations': as(
    'save-population',
    'own',
  )({ body: () => ({ ...population, name: 'Flat' }) }),
  'get /populations/{population}': read(),
  'patch /populations/{population}': as('share-population')({ body: () => ({ isShared: true }) }),
  'post /populations/{population}/versions': as(
    'save-population',
    'maker',
  )({ body: () => population }),
  'get /analyses': read(),
  'post /analyses': as(
    'save-analysis',
    'own',
  )({ body: (ids) => ({ name: 'Plover alone', recipe: recipe(ids) }) }),
  'get /analyses/{analysis}': read(),
  'patch /analyses/{analysis}': as(
    'save-analysis',
    'maker',
  )({ body: (ids) => ({ recipe: recipe(ids) }) }),
  'delete /analyses/{analysis}': as(
    'remove-analysis',
    'maker',
  )({ ids: (ids) => ({ ...ids, analysis: ids.draft }) }),
  'post /analyses/{analysis}/copy': as('copy-analysis')({ body: () => ({}) }),
  'get /analyses/{analysis}/runs': read(),
  'post /analyses/{analysis}/runs': runIts(),
  'get /runs/{run}': read(),
  'get /runs/{run}/maps': read(),
  'post /figures': read({ file: { type: 'image/svg+xml', text: figure } }),
  'get /runs/{run}/studies': read(),
  'post /runs/{run}/studies': runIts({
    body: ({ table }) => ({
      kind: 'systematics',
      changes: [{ change: 'cooling', coolingTableId: table }],
    }),
  }),
  'get /studies': read(),
  'get /studies/{study}': read(),
  'get /studies/{study}/maps': read({ ids: (ids) => ({ ...ids, study: ids.keptMaps }) }),
  'delete /studies/{study}': runIts(),
  'get /jobs': read(),
  'get /jobs/{job}': read(),
  'post /jobs/{job}/cancel': runIts(),
  'post /jobs/{job}/retry': runIts(),
  'get /runs/{run}/exports': read(),
  'get /runs/{run}/exports/{file}': read(csv('limits.csv')),
  'get /surveys/{survey}/exports': read(),
  'get /surveys/{survey}/exports/{file}': read(csv('targets.csv')),
  'get /samples/{sample}/exports': read(),
  'get /samples/{sample}/exports/{file}': read(csv('targets.csv')),
  'get /stars/exports': read(),
  'get /stars/exports/{file}': read(csv('stars.csv')),
  'get /populations/exports': read(),
  'get /populations/exports/{file}': read(csv('populations.csv')),
  'get /maps/{map}/exports': read(),
  'get /maps/{map}/exports/{file}': read(csv('maps.fits')),
  'get /candidates': read({ query: ({ survey }) => ({ survey }) }),
  'get /candidates/{candidate}': read(),
  'post /candidates/{candidate}/observations': vet({
    body: () => ({
      observedOn: '2026-01-31',
      separationArcsec: 1,
      separationErrorArcsec: 0.1,
      positionAngleDeg: 1,
      positionAngleErrorDeg: 1,
    }),
  }),
  'delete /candidates/{candidate}/observations/{observation}': vet(),
  'post /candidates/{candidate}/verdicts': vet({
    body: () => ({ status: 'background', reason: 'It does not move with the star' }),
  }),
  'get /shares': read(),
  'post /surveys/{survey}/shares': as(
    'offer-survey',
    'lead',
  )({ body: ({ code }) => ({ code, scope: 'maps', attribution: 'The Plover survey' }) }),
  'post /shares/{share}/accept': accept(),
  'post /shares/{share}/refuse': accept(why),
  'post /shares/{share}/refresh': accept(),
  'post /shares/{share}/withdraw': as(
    'offer-survey',
    'lead',
  )({ ...why, ids: (ids) => ({ ...ids, share: ids.given }) }),
  'get /stars': read({ query: ({ survey }) => ({ survey }) }),
  'get /stars/{star}': read(),
  'post /stars/{star}/adopt': as(
    'adopt-values',
    'lead',
  )({ body: (ids) => ({ quantity: 'age', choice: choice(ids), why: 'The newer one' }) }),
  'post /stars/{star}/split': combine({
    body: ({ target }) => ({ targetId: target, why: 'Two stars' }),
  }),
  'get /stars/overlaps': read(),
  'post /stars/overlaps': combine(),
  'post /stars/overlaps/confirm': combine({
    body: ({ pair }) => ({ pairs: [pair], why: 'They said so' }),
  }),
  'post /stars/overlaps/{pair}/confirm': combine(why),
  'post /stars/overlaps/{pair}/refuse': combine(why),
  'post /stars/overlaps/{pair}/undo': combine(why),
  'get /value-tables': read(),
  'post /value-tables': as(
    'adopt-values',
    'lead',
  )({
    body: (ids) => ({
      quantity: 'age',
      choices: [{ starId: ids.star, choice: choice(ids) }],
      why: 'The newer one',
    }),
  }),
  'post /value-tables/preview': read({
    body: (ids) => ({ quantity: 'age', choices: [{ starId: ids.star, choice: choice(ids) }] }),
  }),
  'get /exercises': read(),
  'post /exercises': setExercise({
    body: ({ run }) => ({ title: 'x', task: 'y', runId: run, mayChange: ['prior'] }),
  }),
  'get /exercises/{exercise}': read(),
  'patch /exercises/{exercise}': setExercise({ body: () => ({ title: 'Which prior' }) }),
  'post /exercises/{exercise}/start': as('submit-exercise')(),
  'post /exercises/{exercise}/submissions': as('submit-exercise')({
    body: ({ run }) => ({ runId: run }),
  }),
  'get /exercises/{exercise}/submissions/{submission}': setExercise(),
  'patch /exercises/{exercise}/submissions/{submission}': setExercise({
    body: () => ({ comment: 'Well argued' }),
  }),
  'get /exercises/{exercise}/table': setExercise(),
  'get /runs/{run}/statement': read(),
  'get /notes': read({ query: onSurvey }),
  'post /notes': as('write-note')({
    body: (ids) => ({ on: onSurvey(ids), body: 'Which ages?', replyTo: ids.note }),
  }),
  'post /notes/seen': read({ body: onSurvey }),
  'get /notes/{note}': read(),
  'patch /notes/{note}': as('write-note')({ body: () => ({ isResolved: true }) }),
  'delete /notes/{note}': as('write-note')(),
  'get /activity': read({ query: ({ survey }) => ({ item: survey }) }),
  'get /settings': read(),
  'patch /settings': manage({ body: ({ analysis }) => ({ leadAnalysis: analysis }) }),
  'get /work': as('watch-work')(),
  'get /mail': as('read-audit')(),
  'post /mail/{message}/retry': as('read-audit')(),
};
