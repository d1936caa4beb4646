import type { FigureSettings } from '@/components/charts/figure-context';
import { describeLevel, describePopulation, describePrior } from '@/lib/inference';
import { formatLimit, formatRange } from '@/lib/quantities/display';
import type { RunInputs, RunResult, RunView } from '@/lib/schemas/runs';
import type { ShownResult } from './shown-result';

/** What the figures of a run say: of the recorded result, or of a live setting that is not kept. */
export function runFigures(
  run: RunView,
  inputs: RunInputs,
  result: RunResult,
  shown: ShownResult,
): Omit<FigureSettings, 'toPdf'> {
  const name = `${run.analysis.key}, run ${run.number}`;
  const surveys = inputs.surveys.map((survey) => survey.name).join(', ');
  const sample = `${surveys}: ${result.stars} stars.`;
  const file = `${run.analysis.key}-run-${run.number}`;
  if (!shown.isLive || shown.isOfRun) {
    return {
      ...{ file, title: name, label: `draft, run ${run.number}` },
      caption: [
        `${name}, draft. ${result.statement.sentence}. ${sample}`,
        result.statement.conditions.map((condition) => `${condition}.`).join(' '),
        `SHA-256 ${run.resultDigest ?? ''}`,
      ],
    };
  }
  return {
    file: `${file}-changed`,
    title: `${name}, changed and not recorded`,
    label: `not recorded, changed from run ${run.number}`,
    caption: [liveSentence(shown), `${sample} Changed from ${name}; no run has recorded it.`],
  };
}

/** The limit of a live setting with its conditions. */
export function liveSentence({ answer, quantity, setting, counted }: ShownResult): string {
  const { definition, credibleLevel, prior } = setting;
  const ranges = `${formatRange(definition.massMinMjup, definition.massMaxMjup, 'MJ')}, ${formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, 'AU')}`;
  const limit = answer.isConstrained
    ? `Upper limit ${formatLimit(answer.limit, quantity)} (${describeLevel(credibleLevel)})`
    : 'No limit';
  return `${limit}: ${ranges}; ${describePrior(prior, quantity)}; ${describePopulation(definition)}; ${counted.length} detections counted.`;
}
