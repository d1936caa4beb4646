import { createHash, randomBytes } from 'node:crypto';
import { AGE_SHIFTS } from '@/lib/schemas/stack-choices';
import { encodeMap } from '@/lib/sensitivity';
import { CompletenessMapRow, database, RunRow, type TargetRow } from '@/models';
import { buildExportRun, mapOfStar } from './export-run';

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
/** The hash of something that nobody knows. */
export const secret = () => sha256(randomBytes(16).toString('hex'));

/** One row of a table past its model; columns by their names in the database. */
export async function insert(table: string, row: Record<string, unknown>): Promise<string> {
  const columns = Object.keys(row);
  const marks = columns.map((_, i) => `$${i + 1}`);
  const [rows] = await database().query(
    `insert into ${table} (${columns}) values (${marks}) returning *`,
    { bind: Object.values(row) },
  );
  return (rows[0] as { id: string }).id;
}

const FILE = 'name,distance_pc\nStar of a file,12\n';

export async function buildUpload(surveyId: string, collaborationId: string, state: string) {
  const id = await insert('upload', {
    collaboration_id: collaborationId,
    survey_id: surveyId,
    kind: 'targets',
    file_name: 'stars.csv',
    byte_length: FILE.length,
    sha256: sha256(FILE),
    state,
    stored_at: state === 'stored' ? new Date() : null,
  });
  await insert('upload_part', { upload_id: id, part_number: 0, bytes: Buffer.from(FILE) });
  return id;
}

const computed = buildExportRun();

/** The map that each star of the run names, on the run's own grid. */
export async function buildMap(collaborationId: string, target: TargetRow) {
  const { grid, stars } = computed.inputs;
  const nodeValues = Buffer.from(encodeMap(mapOfStar(0)).buffer);
  const map = await CompletenessMapRow.create({
    collaborationId,
    digest: stars[0].mapDigest,
    origin: 'computed',
    engineVersion: '1',
    ...grid,
    nodeValues,
    checksum: createHash('sha256').update(nodeValues).digest('hex'),
    inputs: {},
  });
  await target.update({ mapId: map.id, mapState: 'ready' });
  return map.id;
}

/** A finished run with the result of the worker's own function, under ids of this collaboration. */
export async function buildRun(
  collaborationId: string,
  analysis: { id: string; recipe: RunRow['recipe'] },
  { personId, map }: { personId: string; map: string },
) {
  const { result, seed, engineVersion, resultDigest } = computed;
  const jobId = await insert('job', {
    collaboration_id: collaborationId,
    kind: 'compute-run',
    status: 'done',
    requested_by: personId,
  });
  const run = await RunRow.create({
    collaborationId,
    analysisId: analysis.id,
    number: 1,
    jobId,
    recipe: analysis.recipe,
    seed,
    engineVersion,
    inputs: {
      ...computed.inputs,
      stars: computed.inputs.stars.map((star) => ({ ...star, mapId: map })),
    },
    inputsDigest: resultDigest,
    result,
    resultDigest,
    createdBy: personId,
    finishedAt: new Date(),
  });
  await insert('frozen_run', {
    collaboration_id: collaborationId,
    run_id: run.id,
    checks: '[]',
    snapshot: Buffer.from('bytes'),
    snapshot_sha256: secret(),
    frozen_by_name: 'R. Castellan',
  });
  return run;
}

/** An answered question about ages and cooling that keeps one stack: the run's own maps once more. */
export async function buildKeptMaps(run: RunRow, map: string): Promise<string> {
  const { collaborationId, createdBy } = run;
  const job = await insert('job', {
    ...{ collaboration_id: collaborationId, kind: 'compute-study', status: 'done' },
    requested_by: createdBy,
  });
  const row = { limit: 0.1, exposure: 1, fault: null, hasMaps: true, starsUnchanged: 0 };
  const model = { model: 'as-run', name: 'as it was', startCondition: 'unstated' };
  const study = await insert('study', {
    ...{ collaboration_id: collaborationId, run_id: run.id, number: 2, job_id: job },
    ...{ kind: 'ages-cooling', settings: '{"kind": "ages-cooling"}', settings_digest: secret() },
    ...{ seed: '0', engine_version: '1', created_by: createdBy },
    ...{ headline: 'One', result_digest: secret(), finished_at: new Date() },
    result: JSON.stringify({
      ...{ kind: 'ages-cooling', baseline: 0.1, ageShifts: AGE_SHIFTS, notes: [] },
      models: [{ ...model, shifts: AGE_SHIFTS.map(() => row) }],
    }),
  });
  for (const position of run.inputs?.stars.keys() ?? []) {
    await insert('study_map', {
      ...{ study_id: study, stack: AGE_SHIFTS.indexOf(0), position },
      ...{ collaboration_id: collaborationId, map_id: map },
    });
  }
  return study;
}
