import type { ResultOf } from '@/lib/schemas/study-results';
import { CompanionRow, TargetRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { WithoutSome } from '../answers/influence';
import { withStars } from '../answers/run-question';
import { combineMaps } from './run-maps';
import type { Sample } from './run-sample';
import { readMaps } from './stored-maps';
import type { StudyPerformer, StudyWork } from './study-context';
import { currentStars } from './study-roots';
import { loadRunSample } from './study-sample';

type Result = ResultOf<'influence'>;

/** A star that moves the limit by more than this is worth a warning. */
const STRONG = 0.2;

/** Limit and exposure without each star, each group and each survey, beside those with all. */
export const performInfluence: StudyPerformer<'influence'> = async (given, settings) => {
  const { run, question } = given;
  const { inputs, result } = run;
  await given.report('stars', 0, inputs.stars.length);
  const groups = await groupStars(given, settings.groupBy);
  const members = [...groups].map(([name, stars]) => ({ name, stars }));
  const found = await given.compute('influence', { question, groups: members });
  await given.report('stars', inputs.stars.length, inputs.stars.length);
  const surveys = await withoutEachSurvey(given, found.limit);
  const beside = (without: WithoutSome) => ({ ...without, ratio: without.limit / found.limit });
  const stars = inputs.stars
    .flatMap(({ starId, name }, i) => {
      const without = found.stars[i];
      if (without === null) return [];
      const hosts = result.counted.filter((one) => one.starId === starId).map((one) => one.name);
      return { starId, name, probability: found.completeness[i], hosts, without: beside(without) };
    })
    .sort(
      (a, b) =>
        Math.abs(Math.log(b.without.ratio)) - Math.abs(Math.log(a.without.ratio)) ||
        (a.name < b.name ? -1 : 1),
    );
  return {
    kind: 'influence',
    limit: found.limit,
    exposure: found.exposure,
    stars,
    surveys,
    groups: members.flatMap(({ name, stars: { length } }, i) => {
      const without = found.groups[i];
      return without ? { name, stars: length, without: beside(without) } : [];
    }),
    halfCarriedBy: countHalf(found.completeness),
    notes: notesOf(inputs.surveys.length, stars),
  };
};

/** The smallest number of stars whose completeness makes up half of the sum. */
function countHalf(completeness: number[]): number {
  const sorted = [...completeness].sort((a, b) => b - a);
  const half = sorted.reduce((sum, c) => sum + c, 0) / 2;
  let sum = 0;
  for (const [i, c] of sorted.entries()) {
    sum += c;
    if (sum >= half) return i + 1;
  }
  return sorted.length;
}

/** Stars by moving group or by the letter of their spectral type; those without are in none. */
async function groupStars(
  { run, collaborationId }: StudyWork,
  groupBy: 'moving-group' | 'spectral-type',
): Promise<Map<string, number[]>> {
  const current = await currentStars(run.inputs.stars.map(({ starId }) => starId));
  const rows = await TargetRow.findAll({
    attributes: ['starId', 'surveyId', 'movingGroup', 'spectralType'],
    where: { collaborationId, starId: [...current.values()] },
  });
  const groupOf = ({ movingGroup, spectralType }: TargetRow) =>
    groupBy === 'moving-group'
      ? movingGroup
      : (/[OBAFGKMLTY]/.exec(spectralType ?? '')?.[0] ?? null);
  const groups = new Map<string, number[]>();
  for (const [i, { starId, surveys }] of run.inputs.stars.entries()) {
    const own = surveys.map((id) =>
      rows.find((row) => row.starId === current.get(starId) && row.surveyId === id),
    );
    const name = own.map((row) => row && groupOf(row)).find((one) => one != null);
    if (name != null) groups.set(name, [...(groups.get(name) ?? []), i]);
  }
  return new Map([...groups].sort(([a], [b]) => (a < b ? -1 : 1)));
}

/** Surveys in which a companion was confirmed; one that is not there any more stays with its star. */
async function surveysOfCompanions({ run }: StudyWork): Promise<Map<string, Set<string>>> {
  const { companions } = run.inputs;
  const rows = await CompanionRow.findAll({
    attributes: ['id', 'targetId'],
    where: { id: companions.flatMap(({ companionIds }) => companionIds) },
  });
  const targets = await TargetRow.findAll({
    attributes: ['id', 'surveyId'],
    where: { id: rows.map(({ targetId }) => targetId) },
  });
  const surveyOf = new Map(targets.map(({ id, surveyId }) => [id, surveyId]));
  return new Map(
    companions.map(({ name, companionIds }) => [
      name,
      new Set(
        rows
          .filter(({ id }) => companionIds.includes(id))
          .flatMap(({ targetId }) => surveyOf.get(targetId) ?? []),
      ),
    ]),
  );
}

async function withoutEachSurvey(given: StudyWork, limit: number): Promise<Result['surveys']> {
  const { surveys, stars } = given.run.inputs;
  if (surveys.length === 1) return [];
  const isShared = stars.some((star) => star.surveys.length > 1);
  const sample = isShared ? await loadRunSample(given) : null;
  const foundIn = await surveysOfCompanions(given);
  const rows: Result['surveys'] = [];
  for (const [i, { id, name, entries }] of surveys.entries()) {
    await given.report('surveys', i, surveys.length);
    const without = await withoutSurvey(given, sample, foundIn, id);
    if (without === null) continue;
    const { limit: other, exposure } = without;
    rows.push({
      id,
      name,
      stars: entries,
      without: { limit: other, exposure, ratio: other / limit },
    });
  }
  await given.report('surveys', surveys.length, surveys.length);
  return rows;
}

/** Shared stars keep what the other surveys saw, combined again by the run's rule. */
async function withoutSurvey(
  given: StudyWork,
  sample: Sample | null,
  foundIn: Map<string, Set<string>>,
  surveyId: string,
): Promise<WithoutSome | null> {
  const { run, grid, question, collaborationId } = given;
  const { stars } = run.inputs;
  const kept = stars.flatMap(({ surveys }, i) => (surveys.some((id) => id !== surveyId) ? i : []));
  if (kept.length === 0) return null;
  const isTouched = (star: number) =>
    stars[star].surveys.length > 1 && stars[star].surveys.includes(surveyId);
  const digests = new Map(stars.map(({ starId, mapDigest }) => [starId, mapDigest]));
  if (sample && kept.some(isTouched)) {
    const touched = new Set(kept.filter(isTouched).map((star) => stars[star].starId));
    const rest = sample.stars
      .filter(({ starId }) => touched.has(starId))
      .map((star) => ({
        ...star,
        entries: star.entries.filter(({ survey }) => survey.row.id !== surveyId),
      }));
    const again = await combineMaps(
      given.work,
      { ...sample, stars: rest },
      run.recipe.combination,
      grid,
      () => Promise.resolve(),
    );
    for (const [starId, digest] of again) digests.set(starId, digest);
    given.further.push({ what: `maps without survey ${surveyId}`, digest: digestOf([...again]) });
  }
  const isLost = (name: string) => {
    const surveys = foundIn.get(name);
    return surveys !== undefined && surveys.size === 1 && surveys.has(surveyId);
  };
  const maps = await readMaps(
    collaborationId,
    stars.map(({ starId }) => digests.get(starId) as string),
    grid,
  );
  const { limit, exposure } = await given.compute(
    'limit',
    withStars(
      { ...question, maps, detections: question.detections.filter(({ name }) => !isLost(name)) },
      kept,
    ),
  );
  return { limit, exposure };
}

function notesOf(surveys: number, stars: Result['stars']): string[] {
  const notes: string[] = [];
  if (surveys === 1) notes.push('One survey: without it nothing is left to compare');
  if (stars.length === 0) notes.push('One star: without it nothing is left to compare');
  const strong = stars.filter(({ without }) => Math.abs(without.ratio - 1) > STRONG);
  if (strong.length > 0) {
    const names = strong.map(({ name }) => name).join(', ');
    notes.push(`More than 20 % of the limit rests on one star each: ${names}`);
  }
  return notes;
}
