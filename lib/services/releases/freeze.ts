import { type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, InputError } from '@/lib/errors';
import { packFiles } from '@/lib/formats/bundle';
import type { FreezeCheck, FreezeStanding } from '@/lib/schemas/releases';
import {
  AnalysisRow,
  FrozenRunRow,
  inTransaction,
  type RunRow,
  StudyRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { writeContent } from '@/models/bundle-files';
import { sha256Hex } from '@/models/digest';
import { refreshWords } from '@/models/engines-of-run';
import { readMapStates } from '@/models/map-standings';
import { recordAudit } from '../audit';
import { readRunFacts } from '../run-facts';
import { findRun } from '../runs';
import { CHANGED, collectContent } from './collect-bundle';

async function calibrationCheck(run: RunRow): Promise<FreezeCheck> {
  const studies = await StudyRow.findAll({
    attributes: ['result'],
    where: { runId: run.id, kind: 'calibration' },
    order: [['number', 'DESC']],
  });
  const done = studies.find(({ result }) => result?.kind === 'calibration')?.result;
  const base = { name: 'calibration' as const, stops: false };
  if (done?.kind !== 'calibration') {
    const words = 'Not calibrated: no simulated surveys were run through this likelihood';
    return { ...base, isMet: false, words };
  }
  const { passes: isMet, verdict } = done;
  return {
    ...base,
    isMet,
    words: `${isMet ? 'Calibrated' : 'Calibrated, not passed'}: ${verdict}`,
  };
}

function candidateCheck({ inputs, recipe }: RunRow): FreezeCheck {
  const inside = (inputs?.undecided ?? []).filter(({ insideRanges }) => insideRanges !== false);
  const isMet = inside.length === 0 || recipe.candidates !== undefined;
  const names = inside.map(({ name }) => name).join(', ');
  return {
    name: 'candidates',
    stops: false,
    isMet,
    words:
      inside.length === 0
        ? 'No candidate without an answer inside the ranges'
        : `${isMet ? 'Counted by their probability' : 'Without an answer inside the ranges'}: ${names}`,
  };
}

/**
 * Whether the maps of a run's stars are what their curves give now: whoever checks a release makes
 * them anew, and would find other numbers. Uploaded maps are kept as they are.
 */
async function mapsCheck({ collaborationId, recipe, inputs }: RunRow): Promise<FreezeCheck> {
  const { surveyIds } = recipe;
  const base = { name: 'maps' as const, stops: true };
  const surveys = await SurveyRow.findAll({
    where: { collaborationId, id: surveyIds },
    order: [['position', 'ASC']],
  });
  const targets = await TargetRow.findAll({
    attributes: ['id'],
    where: {
      surveyId: surveyIds,
      starId: inputs?.stars.map(({ starId }) => starId) ?? [],
      leftOutReason: null,
    },
  });
  const used = new Set(targets.map(({ id }) => id));
  const statesOf = await readMapStates(surveys);
  const stale = surveys.flatMap(({ id, name }) => {
    const states = (statesOf.get(id) ?? []).filter(
      ({ targetId, standing, reason }) =>
        used.has(targetId) && standing === 'stale' && reason !== 'uploaded',
    );
    return states.length === 0 ? [] : [{ name, states }];
  });
  if (stale.length === 0) {
    return { ...base, isMet: true, words: 'Maps are of the present engine and settings' };
  }
  const counts = stale.map(({ name, states }) => {
    const { target, words } = states[0];
    return `${states.length} of ${name} (${target}: ${words})`;
  });
  const names = stale.map(({ name }) => name);
  return {
    ...base,
    isMet: false,
    words: `Maps that their curves would not give now: ${counts.join(', ')}. ${refreshWords(names)}`,
  };
}

async function checksOf(run: RunRow): Promise<FreezeCheck[]> {
  const facts = (await readRunFacts([run.analysisId])).find(({ id }) => id === run.id);
  const isMet = facts !== undefined && !facts.hasOlderInputs;
  const inputs: FreezeCheck = {
    name: 'inputs',
    isMet,
    stops: true,
    words: isMet ? 'Inputs unchanged since the run' : CHANGED,
  };
  return [inputs, await mapsCheck(run), await calibrationCheck(run), candidateCheck(run)];
}

const folderOf = (analysis: AnalysisRow, run: RunRow) => `A-${analysis.number}-run-${run.number}`;

/** How a run stands to being frozen: what is met, what asks for a reason. */
export async function getFreezeStanding(actor: Actor, runId: string): Promise<FreezeStanding> {
  const run = await findRun(actor, runId);
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const frozen = await FrozenRunRow.findOne({
    attributes: { exclude: ['snapshot'] },
    where: { runId: run.id },
  });
  return {
    run: { id: run.id, number: run.number, analysisKey: `A-${analysis.number}` },
    checks: frozen ? frozen.checks : run.result ? await checksOf(run) : [],
    frozen: frozen && {
      by: frozen.frozenByName,
      at: frozen.frozenAt.toISOString(),
      reason: frozen.reason,
      sha256: frozen.snapshotSha256,
    },
    canFreeze: may(actor, 'freeze-run') && !frozen && run.result !== null,
    canLink: may(actor, 'link-guest'),
  };
}

async function storeFrozen(
  actor: Actor,
  { run, analysis, reason, checks }: FreezeParts,
  transaction: Transaction,
): Promise<void> {
  const { number, name } = analysis;
  const content = await collectContent(run, 'frozen', { number, name }, transaction);
  const folder = folderOf(analysis, run);
  const files = [...writeContent(content)].map(([path, bytes]) => ({
    name: `${folder}/${path}`,
    bytes,
  }));
  const snapshot = await packFiles(files);
  await FrozenRunRow.create(
    {
      collaborationId: actor.collaborationId,
      runId: run.id,
      reason: reason || null,
      checks,
      snapshot,
      snapshotSha256: sha256Hex(snapshot),
      frozenBy: actor.personId,
      frozenByName: actor.personName,
    },
    { transaction },
  );
  const summary = `froze A-${number}, run ${run.number}`;
  const details = reason ? { reason } : {};
  const item = { kind: 'run', id: run.id };
  await recordAudit(actor, 'freeze-run', item, summary, transaction, details);
}

interface FreezeParts {
  run: RunRow;
  analysis: AnalysisRow;
  reason: string | undefined;
  checks: FreezeCheck[];
}

/**
 * Freezes a finished run with its inputs, for good.
 *
 * @throws Conflict when its inputs have changed, or it is frozen already; InputError when a check is
 *   not met and no reason is given
 */
export async function freezeRun(
  actor: Actor,
  runId: string,
  { reason }: { reason?: string },
): Promise<FreezeStanding> {
  const run = await findRun(actor, runId);
  demand(actor, 'freeze-run');
  if (!run.result) throw new Conflict('This run has no result: there is nothing to freeze');
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const checks = await checksOf(run);
  const stopping = checks.find(({ isMet, stops }) => stops && !isMet);
  if (stopping) throw new Conflict(stopping.words);
  const unmet = checks.filter(({ isMet }) => !isMet);
  if (unmet.length > 0 && !reason) {
    throw new InputError({
      code: 'reason',
      column: 'reason',
      found: 'none',
      expected: `why it is frozen all the same: ${unmet.map(({ words }) => words).join('; ')}`,
    });
  }
  try {
    await inTransaction((transaction) =>
      storeFrozen(actor, { run, analysis, reason, checks }, transaction),
    );
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new Conflict('This run is frozen already');
    throw error;
  }
  return getFreezeStanding(actor, runId);
}
