import { InputError } from '@/lib/errors';
import { listFirst } from '@/lib/queue/preconditions';
import type { ResultOf } from '@/lib/schemas/study-results';
import { combinationBounds, encodeMap, regridNodes } from '@/lib/sensitivity';
import { CompletenessMapRow } from '@/models';
import { digestOf } from '@/models/digest';
import { mapOfRow } from '@/models/map-on-grid';
import type { LimitOutput } from '../answers/limit';
import { combineMaps } from './run-maps';
import type { Sample } from './run-sample';
import { readMaps } from './stored-maps';
import type { StudyPerformer, StudyWork } from './study-context';
import { loadRunSample } from './study-sample';

type Result = ResultOf<'overlap-rules'>;

const RULES = ['same-position', 'deepest', 'independent'] as const;

/** What each rule for a star in several surveys would give, between what holds whatever the rule. */
export const performOverlapRules: StudyPerformer<'overlap-rules'> = async (given) => {
  const { run } = given;
  const sample = await loadRunSample(given);
  const rules: Result['rules'] = [];
  const answers = new Map<(typeof RULES)[number], LimitOutput>();
  for (const [i, rule] of RULES.entries()) {
    await given.report('rules', i, RULES.length + 1);
    const found = await answerUnder(given, sample, rule);
    if (typeof found === 'string') {
      rules.push({ rule, limit: null, exposure: null, fault: found });
      continue;
    }
    answers.set(rule, found);
    rules.push({ rule, limit: found.limit, exposure: found.exposure, fault: null });
  }
  const shared = sample.stars.filter(({ entries }) => entries.length > 1);
  rules.push({
    rule: 'refuse',
    limit: null,
    exposure: null,
    fault: `Stars in several surveys: ${listFirst(shared.map(({ name }) => name))}`,
  });
  const bracket = await boundLimit(given, sample);
  await given.report('rules', RULES.length + 1, RULES.length + 1);
  const seen = (rule: (typeof RULES)[number], i: number) => answers.get(rule)?.completeness[i];
  return {
    kind: 'overlap-rules',
    ruleUsed: run.inputs.combination,
    rules,
    bracket,
    shared: sample.stars.flatMap(({ starId, name, entries }, i) => {
      if (entries.length === 1) return [];
      return {
        starId,
        name,
        surveys: entries.map(({ survey }) => survey.row.name),
        probability: {
          samePosition: seen('same-position', i) ?? null,
          deepest: seen('deepest', i) as number,
          independent: seen('independent', i) as number,
        },
      };
    }),
    notes: [
      'Independent epochs are optimistic for repeated observations: the inclination is shared, ' +
        'however far apart they are',
    ],
  };
};

async function answerUnder(
  given: StudyWork,
  sample: Sample,
  rule: (typeof RULES)[number],
): Promise<LimitOutput | string> {
  const { work, grid, question, collaborationId } = given;
  try {
    const byStar = await combineMaps(work, sample, rule, grid, () => Promise.resolve());
    const digests = sample.stars.map(({ starId }) => byStar.get(starId) as string);
    given.further.push({ what: `maps, ${rule}`, digest: digestOf(digests) });
    const maps = await readMaps(collaborationId, digests, grid);
    return await given.compute('limit', { ...question, maps });
  } catch (error) {
    if (error instanceof InputError) return error.message;
    throw error;
  }
}

/**
 * The limit at both Fréchet bounds of each shared star: the largest of its maps, and their sum
 * capped at 1.
 */
async function boundLimit(given: StudyWork, sample: Sample): Promise<Result['bracket']> {
  const { question, grid } = given;
  const size = grid.massMjup.length * grid.semiMajorAxisAu.length;
  const ends = { lower: question.maps.slice(), upper: question.maps.slice() };
  for (const [i, { entries }] of sample.stars.entries()) {
    if (entries.length === 1) continue;
    const rows = await CompletenessMapRow.findAll({
      where: { id: entries.map(({ map }) => map.id) },
      order: [['digest', 'ASC']],
    });
    const bounds = combinationBounds(rows.map(mapOfRow));
    for (const end of ['lower', 'upper'] as const) {
      ends[end].set(encodeMap(regridNodes(bounds[end], grid).map.completeness), i * size);
    }
  }
  const { limit: highest } = await given.compute('limit', { ...question, maps: ends.lower });
  const { limit: lowest } = await given.compute('limit', { ...question, maps: ends.upper });
  return { lowest, highest };
}
