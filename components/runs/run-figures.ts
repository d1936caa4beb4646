import type { FigureSettings } from '@/components/charts/figure-context';
import { describeLevel, describePopulation, describePrior } from '@/lib/inference';
import { formatLimit, formatRange } from '@/lib/quantities/display';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import type { ShownResult } from './shown-result';

/** What the figures of a run say: of the recorded result, or of a live setting that is not kept. */
export function runFigures(
  run: DrawnRun,
  inputs: DrawnInputs,
  result: DrawnResult,
  shown: ShownResult,
): Omit<FigureSettings, 'toPdf'> {
  if (!shown.isLive || shown.isOfRun) return recordedFigures(run, inputs, result);
  const name = nameOf(run);
  return {
    file: `${fileOf(run)}-changed`,
    title: `${name}, changed and not recorded`,
    label: `not recorded, changed from run ${run.number}`,
    caption: [
      liveSentence(shown),
      `${sampleWords(inputs, result)} Changed from ${name}; no run has recorded it.`,
    ],
  };
}

/** What the figures of a run say of the result that it recorded. */
export function recordedFigures(
  run: DrawnRun,
  inputs: DrawnInputs,
  result: DrawnResult,
): Omit<FigureSettings, 'toPdf'> {
  const name = nameOf(run);
  const standing = run.frozen ?? 'draft';
  return {
    ...{ file: fileOf(run), title: name, label: `${standing}, run ${run.number}` },
    caption: [
      `${name}, ${standing}. ${result.statement.sentence}. ${sampleWords(inputs, result)}`,
      result.statement.conditions.map((condition) => `${condition}.`).join(' '),
      `SHA-256 ${run.resultDigest ?? ''}`,
    ],
  };
}

const nameOf = (run: DrawnRun) => `${run.analysis.key}, run ${run.number}`;
const fileOf = (run: DrawnRun) => `${run.analysis.key}-run-${run.number}`;

function sampleWords({ surveys }: DrawnInputs, { stars }: DrawnResult): string {
  return `${surveys.map(({ name }) => name).join(', ')}: ${stars} stars.`;
}

/** The limit of a live setting with its conditions. */
export function liveSentence({
  answer,
  quantity,
  setting,
  counted,
  ...shown
}: ShownResult): string {
  const { definition, credibleLevel, prior } = setting;
  const ranges = `${formatRange(definition.massMinMjup, definition.massMaxMjup, 'MJ')}, ${formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, 'AU')}`;
  const limit = answer.isConstrained
    ? `Upper limit ${formatLimit(answer.limit, quantity)} (${describeLevel(credibleLevel)})`
    : 'No limit';
  return `${limit}: ${ranges}; ${describePrior(prior, quantity)}; ${describePopulation(definition)}; ${counted.length} detections counted; ${[shown.cooling, shown.ages].filter(Boolean).join('; ')}.`;
}
