import { describePopulation, viewPopulation } from '@/lib/inference';
import { comparePopulations } from '@/lib/inference/population-comparison';
import type { Population } from '@/lib/population';
import type { ResultOf } from '@/lib/schemas/study-results';
import { answerRunQuestion, type RunQuestion } from './run-question';

export interface ComparedInput {
  populationId: string;
  key: string;
  version: number;
  name: string;
  population: Population;
}

export interface ComparisonInput {
  question: RunQuestion;
  /** The run's own first. */
  populations: ComparedInput[];
}

type Row = ResultOf<'population-comparison'>['rows'][number];
type Settled<Value> = { value: Value } | { fault: string };

function attempt<Value>(work: () => Value): Settled<Value> {
  try {
    return { value: work() };
  } catch (error) {
    if (error instanceof RangeError) return { fault: error.message };
    throw error;
  }
}

/** Limit and evidence of the same data under each population, weighed against the run's own. */
export function answerComparison({ question, populations }: ComparisonInput) {
  const asked = populations.map(({ population }) => ({ ...question, population }));
  const views = asked.map(({ maps, grid, population, hostMassMsun }) =>
    attempt(() => viewPopulation(maps, grid, population, hostMassMsun)),
  );
  const usable = populations.flatMap(({ populationId }, i) => {
    const view = views[i];
    return 'value' in view ? { name: populationId, view: view.value } : [];
  });
  const compared = attempt(() => comparePopulations(usable, question));
  const evidenceOf = (id: string) =>
    'value' in compared ? compared.value.rows.find(({ name }) => name === id) : undefined;
  const rows = populations.map(({ population, ...named }, i): Row => {
    const view = views[i];
    const isOwn = i === 0;
    const words = describePopulation(population);
    if ('fault' in view) {
      return { ...named, words, isOwn, ...nothing, fault: view.fault };
    }
    const answer = attempt(() => answerRunQuestion(asked[i]));
    const evidence = evidenceOf(named.populationId);
    const finite = (value: number | null | undefined) =>
      value != null && Number.isFinite(value) ? value : null;
    return {
      ...named,
      words,
      isOwn,
      limit: 'value' in answer ? answer.value.limit : null,
      exposure: 'value' in answer ? answer.value.exposure : view.value.exposure,
      detections: 'value' in answer ? answer.value.counted.length : null,
      logEvidence: finite(evidence?.logEvidence),
      logBayesFactor: finite(evidence?.logBayesFactor),
      fault: ('fault' in answer ? answer.fault : null) ?? evidence?.fault ?? null,
    };
  });
  return { rows, notes: notesOf(question, compared) };
}

const nothing = {
  limit: null,
  exposure: null,
  detections: null,
  logEvidence: null,
  logBayesFactor: null,
};

function notesOf(
  { candidates, background }: RunQuestion,
  compared: Settled<ReturnType<typeof comparePopulations>>,
): string[] {
  if ('fault' in compared) return [`No evidence: ${compared.fault}`];
  const [low, high] = compared.value.priorRange;
  const notes = [
    `The factors hold for this prior of the rate, which reaches from ${low} to ${high}`,
    ...compared.value.notes,
  ];
  if (candidates !== null || background !== null) {
    notes.push(
      'The evidence weighs confirmed companions alone; the limits count what the run counts',
    );
  }
  return notes;
}
