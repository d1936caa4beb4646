import type { Transaction } from 'sequelize';
import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { select } from '@/lib/queue/statement';
import { type StudyInputs, studyInputsSchema } from '@/lib/schemas/studies';
import { type StudyResult, studyResultSchema } from '@/lib/schemas/study-results';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { inTransaction, RunRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { Work } from '../perform';
import { tellOfEnd } from '../run-mail';
import { performAgesCooling } from './study-ages-cooling';
import { performCalibration } from './study-calibration';
import { performComparison } from './study-comparison';
import { openStudy, type StudyPerformer, type StudyWork } from './study-context';
import { performCounts } from './study-counts';
import { performForecast } from './study-forecast';
import { performFreeIndices } from './study-free-indices';
import { performInfluence } from './study-influence';
import { performLimitMap, performSweep } from './study-limits';
import { performOverlapRules } from './study-overlap-rules';
import { performSystematics } from './study-systematics';
import { headlineOf } from './study-words';

const studyKinds: { [Kind in StudyKind]: StudyPerformer<Kind> } = {
  'ages-cooling': performAgesCooling,
  'free-indices': performFreeIndices,
  counts: performCounts,
  forecast: performForecast,
  calibration: performCalibration,
  influence: performInfluence,
  'limit-map': performLimitMap,
  sweep: performSweep,
  'overlap-rules': performOverlapRules,
  'population-comparison': performComparison,
  systematics: performSystematics,
};

/**
 * Computes a further question of a finished run. The result is stored once, in the transaction that
 * ends the job, by the attempt that holds it.
 */
export async function performComputeStudy(work: Work): Promise<void> {
  await reportProgress(work.attempt, 'collect', 0, 1);
  const given = await openStudy(work);
  const { settings } = given.study;
  const perform = studyKinds[settings.kind] as StudyPerformer<StudyKind>;
  const result = studyResultSchema.parse(await perform(given, settings));
  await given.report('store', 0, 1);
  await store(given, result);
}

async function describeInputs({ study, run, further }: StudyWork): Promise<StudyInputs> {
  const row = await RunRow.findByPk(run.id, {
    attributes: ['inputsDigest', 'resultDigest'],
    rejectOnEmpty: true,
  });
  return studyInputsSchema.parse({
    engineVersion: study.engineVersion,
    seed: study.seed,
    runId: run.id,
    runInputsDigest: row.inputsDigest,
    runResultDigest: row.resultDigest,
    further: [...further].sort((a, b) => (a.what < b.what ? -1 : a.what > b.what ? 1 : 0)),
  });
}

async function store(given: StudyWork, result: StudyResult): Promise<void> {
  const { work, study, run } = given;
  const inputs = await describeInputs(given);
  await inTransaction(async (transaction) => {
    await hold(transaction, work.attempt);
    await study.update(
      {
        inputs,
        inputsDigest: digestOf({ settings: study.settings, inputs }),
        result,
        resultDigest: digestOf(result),
        headline: headlineOf(result, { ...run.result, limit: run.result.answer.limit }),
        finishedAt: new Date(),
      },
      { transaction },
    );
    await keepMaps(given, transaction);
    await reportProgress(work.attempt, 'store', 1, 1, transaction);
    await complete(transaction, work.attempt);
    await tellOfEnd(transaction, work.attempt.jobId, 'finished');
  });
}

async function keepMaps(given: StudyWork, transaction: Transaction): Promise<void> {
  const { study, collaborationId, kept } = given;
  for (const { stack, digests } of kept) {
    const stored = await select(
      `insert into study_map (study_id, stack, position, collaboration_id, map_id)
       select $1, $2, (wanted.place - 1)::int, $3, m.id
       from unnest(array(select jsonb_array_elements_text($4::jsonb))) with ordinality
         as wanted(digest, place)
       join completeness_map m on m.collaboration_id = $3 and m.digest = wanted.digest
       returning position`,
      [study.id, stack, collaborationId, JSON.stringify(digests)],
      transaction,
    );
    if (stored.length !== digests.length) {
      throw new Error(`${stored.length} of ${digests.length} maps of stack ${stack} are stored`);
    }
  }
}
