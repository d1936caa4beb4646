import type { WrittenTable } from '@/lib/formats';
import type { RunInputs } from '@/lib/schemas/runs';
import { CompanionRow, SurveyRow, TargetRow } from '@/models';
import type { FinishedRun } from '../export-limits';
import { companionsTable, targetsTable, writtenCompanion, writtenTarget } from './written-rows';

interface Use {
  used: boolean;
  reason: string | null;
}

const byName = (a: TargetRow, b: TargetRow) =>
  a.foldedName < b.foldedName ? -1 : a.foldedName > b.foldedName ? 1 : 0;

/** The targets of a run's surveys as these list them today, by survey and name. */
async function loadEntries({ collaborationId, inputs }: FinishedRun) {
  const ids = inputs.surveys.map(({ id }) => id);
  const [surveys, targets] = await Promise.all([
    SurveyRow.findAll({ where: { collaborationId, id: ids } }),
    TargetRow.findAll({ where: { collaborationId, surveyId: ids } }),
  ]);
  return inputs.surveys.flatMap(({ id, slug, name }) => {
    const survey = surveys.find((row) => row.id === id);
    if (!survey) return [];
    return targets
      .filter(({ surveyId }) => surveyId === id)
      .sort(byName)
      .map((target) => ({ target, slug, surveyName: name }));
  });
}

/**
 * Whether a run counts an entry; what the run itself noted decides, not what stands there today.
 *
 * @returns a question that may be asked of every entry, with the survey's name in the run
 */
export function targetUses({ stars, leftOut }: Pick<RunInputs, 'stars' | 'leftOut'>) {
  const keyOf = (name: string, survey: string) => JSON.stringify([name, survey]);
  const reasons = new Map(leftOut.map((left) => [keyOf(left.name, left.survey), left.reason]));
  const surveysOf = new Map(stars.map(({ starId, surveys }) => [starId, surveys]));
  return (target: Pick<TargetRow, 'starId' | 'surveyId' | 'name'>, surveyName: string): Use => {
    const reason = reasons.get(keyOf(target.name, surveyName));
    if (reason !== undefined) return { used: false, reason };
    const surveys = surveysOf.get(target.starId) ?? [];
    if (!surveys.includes(target.surveyId)) {
      return { used: false, reason: 'not listed when the run read its inputs' };
    }
    const others = surveys.length - 1;
    if (others === 0) return { used: true, reason: null };
    const words = `${others} other survey${others === 1 ? '' : 's'}`;
    return { used: true, reason: `one star with its entries in ${words}` };
  };
}

/** Whether a run counts a companion, and how. */
export function companionUse(
  run: Pick<FinishedRun, 'result' | 'inputs' | 'recipe'>,
  companion: Pick<CompanionRow, 'id' | 'name' | 'status'>,
  star: string | null,
): Use {
  const { result, inputs, recipe } = run;
  const isIt = ({ companionIds }: { companionIds: string[] }) =>
    companionIds.includes(companion.id);
  const counted = result.counted.find(isIt);
  if (counted) {
    const isSecond = result.mergedNames.includes(counted.name);
    return {
      used: true,
      reason: isSecond ? 'the star counts once, for its first companion' : null,
    };
  }
  if (result.outside.some(isIt)) return { used: false, reason: 'outside the ranges' };
  if (inputs.companions.some(isIt)) {
    const setAside = recipe.detections === 'none';
    return { used: false, reason: setAside ? 'all detections set aside' : 'not counted' };
  }
  if (star === null) return { used: false, reason: 'its star is not in the run' };
  const full = `${star} ${companion.name}`;
  const entry = result.candidates?.entries.find(({ name }) => name === full);
  if (entry) {
    return { used: true, reason: `counts with probability ${entry.probability}` };
  }
  const open = inputs.undecided.find(({ name }) => name === full);
  if (open) {
    const outside = open.insideRanges === false ? ', outside the ranges' : '';
    return { used: false, reason: `${open.status}${outside}: set aside` };
  }
  if (companion.status === 'background') {
    return { used: false, reason: 'a background source' };
  }
  return { used: false, reason: 'not known when the run read its inputs' };
}

/** What tells a reader that the values may be newer than the run. */
const asOfToday = ({ hasOlderInputs }: FinishedRun) =>
  [
    'values',
    hasOlderInputs
      ? 'as the surveys list them today: some are newer than the run'
      : 'as the surveys list them, unchanged since the run',
  ] as const;

export async function usedTargetsTable(
  run: FinishedRun,
  head: Pick<WrittenTable, 'provenance'>,
): Promise<WrittenTable> {
  const entries = await loadEntries(run);
  const useOf = targetUses(run.inputs);
  return targetsTable(
    {
      name: 'targets',
      title: `Targets of ${run.analysis}, run ${run.number}`,
      provenance: [...head.provenance, asOfToday(run)],
    },
    entries.map(({ target }) => writtenTarget(target)),
    entries.map(({ target, slug, surveyName }) => ({
      survey: slug,
      ...useOf(target, surveyName),
    })),
  );
}

export async function usedCompanionsTable(
  run: FinishedRun,
  head: Pick<WrittenTable, 'provenance'>,
): Promise<WrittenTable> {
  const entries = await loadEntries(run);
  const companions = await CompanionRow.findAll({
    where: { targetId: entries.map(({ target }) => target.id) },
    order: [['foldedName', 'ASC']],
  });
  const ofTarget = new Map<string, CompanionRow[]>();
  for (const row of companions) {
    ofTarget.set(row.targetId, [...(ofTarget.get(row.targetId) ?? []), row]);
  }
  const rows = entries.flatMap(({ target, slug }) =>
    (ofTarget.get(target.id) ?? []).map((row) => ({ row, target, slug })),
  );
  const starOf = new Map(run.inputs.stars.map(({ starId, name }) => [starId, name]));
  return companionsTable(
    {
      name: 'companions',
      title: `Companions of ${run.analysis}, run ${run.number}`,
      provenance: [...head.provenance, asOfToday(run)],
    },
    rows.map(({ row, target }) => writtenCompanion(row, target.name)),
    rows.map(({ row, target, slug }) => ({
      survey: slug,
      ...companionUse(run, row, starOf.get(target.starId) ?? null),
    })),
  );
}
