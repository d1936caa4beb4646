import type { CalibrationPart } from '@/lib/inference';
import { PopulationRow } from '@/models';
import type { StudyPerformer, StudyWork } from './study-context';
import { hostMassesUnder } from './study-hosts';
import { computeParts } from './study-parts';

/** Few enough that a killed worker loses little, enough that storing costs nothing. */
const SURVEYS_PER_PART = 250;

async function loadTruth(given: StudyWork, id: string | undefined) {
  if (id === undefined) return null;
  const row = await PopulationRow.findOne({
    where: { id, collaborationId: given.collaborationId },
    rejectOnEmpty: true,
  });
  const what = `population P-${row.number} version ${row.version}`;
  given.further.push({ what, digest: row.digest });
  const population = row.definition;
  return {
    name: row.name,
    truth: { population, hostMassMsun: await hostMassesUnder(given, [population]) },
  };
}

/**
 * Invented surveys of the run's own stars, in parts that are each stored at once: the numbers of a
 * part follow from the seed and its number alone, whoever computes it and when.
 */
export const performCalibration: StudyPerformer<'calibration'> = async (given, settings) => {
  const { question, study, run } = given;
  const parts = Math.ceil(settings.surveys / SURVEYS_PER_PART);
  const other = await loadTruth(given, settings.truthPopulationId);
  const plan = await given.compute('calibration-plan', {
    question,
    settings,
    seed: study.seed,
    parts,
    truth: other?.truth ?? null,
  });
  const setups = plan.other ? [plan.own, plan.other] : [plan.own];
  const { surveys } = settings;
  const sharedOut = (part: number) =>
    Math.floor(((part + 1) * surveys) / parts) - Math.floor((part * surveys) / parts);
  const results = await computeParts<CalibrationPart>(given, {
    parts: parts * setups.length,
    stage: 'invented-surveys',
    unitsOf: (part) => sharedOut(part % parts),
    compute: (part) =>
      given.compute('calibration-part', {
        setup: setups[Math.floor(part / parts)],
        part: part % parts,
      }),
  });
  await given.report('coverage', 0, 1);
  const result = await given.compute('calibration-merge', {
    plan,
    own: results.slice(0, parts),
    other: results.slice(parts),
    level: run.recipe.credibleLevel,
    levels: settings.levels,
    truthName: other?.name ?? null,
    hasCandidates: question.candidates !== null,
  });
  await given.report('coverage', 1, 1);
  return result;
};
