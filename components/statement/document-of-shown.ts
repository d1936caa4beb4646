import type { ShownResult } from '@/components/runs/shown-result';
import { countingWords } from '@/lib/inference/run-statement';
import { priorTop } from '@/lib/inference/statement';
import { type LimitDocument, limitDocument } from '@/lib/inference/statement-document';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';

interface ShownOf {
  run: DrawnRun;
  inputs: DrawnInputs;
  result: DrawnResult;
  shown: ShownResult;
  /** Another level of the table, with its limit; the shown one when absent. */
  row?: { level: number; limit: number };
}

/** The limit that a result page shows, live or of its run, with everything that it rests on. */
export function documentOfShown({ run, inputs, result, shown, row }: ShownOf): LimitDocument {
  const { setting, answer, quantity } = shown;
  const isRecorded = !shown.isLive || shown.isOfRun;
  const isNone = setting.detections === 'none';
  const hosts = new Set(shown.counted.map(({ starId }) => starId)).size;
  const found = quantity === 'host_fraction' ? hosts : shown.counted.length;
  const detections = isNone ? 0 : found;
  const level = row?.level ?? setting.credibleLevel;
  const limit = row?.limit ?? answer.limit;
  const { key, version, digest } = inputs.population;
  const counts = { treatment: setting.candidates?.treatment };
  return limitDocument({
    state: isRecorded ? 'recorded' : 'live',
    run: isRecorded
      ? {
          id: run.id,
          analysis: run.analysis.key,
          number: run.number,
          engineVersion: run.engineVersion,
          resultDigest: run.resultDigest,
          population: { key, version, digest },
        }
      : null,
    surveys: inputs.surveys.map(({ name }) => name),
    entries: result.entries,
    countingRule: countingWords(
      {
        recipe: { prior: setting.prior, detections: setting.detections },
        result: { candidates: counts.treatment ? (shown.candidates ?? null) : null },
      },
      isNone,
      quantity,
    ),
    quantity,
    limit,
    credibleLevel: level,
    population: setting.definition,
    prior: setting.prior,
    detections,
    stars: result.stars,
    exposure: shown.exposure,
    combinationRule: inputs.combination,
    cooling: shown.cooling,
    ...(shown.ages !== null && { further: [{ label: 'Ages', text: shown.ages }] }),
    eccentricity: inputs.eccentricity,
    threshold: inputs.threshold,
    shareOutside: Math.max(shown.shareOutsideMaps, 0),
    constrained: answer.isConstrained,
    setByPrior: row ? limit > 0.9 * level * priorTop(setting.prior, quantity) : answer.isSetByPrior,
    ...(shown.candidates && { candidates: shown.candidates }),
    background: setting.background ?? null,
    ...(detections > 0 && {
      interval: {
        kind: 'equal-tailed' as const,
        low: answer.interval68[0],
        high: answer.interval68[1],
        level: 0.68,
      },
    }),
  });
}
