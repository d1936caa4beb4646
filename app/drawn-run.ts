import type { Actor } from '@/lib/access/actor';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { pack } from '@/lib/schemas/packed';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { DrawnRun, RateAnswer, RunSummary, RunView } from '@/lib/schemas/runs';
import { findRun, findRunRecord } from '@/lib/services/runs';

/** Digits of what a page draws: as many as exports carry, and a third of what was computed. */
const DIGITS = 6;
/** Of a SHA-256: so many tell the values of two maps apart. */
const DIGEST_CHARACTERS = 16;
/** Characters of finished runs that are kept, some hundred runs of 500 stars. */
const MOST_KEPT = 24_000_000;

type Drawn = Pick<PackedRun, 'drawn' | 'populationId'>;

const round = (value: number) => Number(value.toPrecision(DIGITS));
const roundAll = (values: number[]) => values.map(round);

function roundCurve(answer: RateAnswer): RateAnswer {
  const { value, density, cumulative, prior } = answer.curve;
  const curve = {
    value: roundAll(value),
    density: roundAll(density),
    cumulative: roundAll(cumulative),
    prior: roundAll(prior),
  };
  return { ...answer, curve };
}

/**
 * What a page draws of a run: its curves, its mean map and the shares of its stars to six digits.
 * Limits, intervals and the nodes of the grid stay as they were computed. What no page draws stays
 * behind.
 */
function asDrawn({
  inputs,
  result,
}: Pick<RunView, 'inputs' | 'result'>): Pick<DrawnRun, 'inputs' | 'result'> {
  if (!inputs || !result) return { inputs, result };
  return {
    inputs: {
      ...inputs,
      stars: inputs.stars.map(({ mapId: _row, mapDigest: _recipe, mapChecksum, ...star }) => ({
        ...star,
        mapChecksum: mapChecksum.slice(0, DIGEST_CHARACTERS),
      })),
    },
    result: {
      ...result,
      answer: roundCurve(result.answer),
      zero: roundCurve(result.zero),
      meanMap: { ...result.meanMap, completeness: result.meanMap.completeness.map(roundAll) },
      depth: {
        ...result.depth,
        surveys: result.depth.surveys.map((one) => ({ ...one, stars: roundAll(one.stars) })),
      },
      starTable: result.starTable.map(({ starId, probability }) => ({
        starId,
        probability: round(probability),
      })),
    },
  };
}

/** By fingerprints of inputs and result: what a finished run holds never changes. */
const kept = new Map<string, Drawn>();
let keptCharacters = 0;

function keep(key: string, packed: Drawn): void {
  if (kept.has(key)) return;
  kept.set(key, packed);
  keptCharacters += packed.drawn.length;
  for (const [oldest, { drawn }] of kept) {
    if (keptCharacters <= MOST_KEPT) return;
    kept.delete(oldest);
    keptCharacters -= drawn.length;
  }
}

async function readDrawn(actor: Actor, id: string): Promise<Drawn> {
  const { inputs, result } = await findRun(actor, id);
  const populationId = inputs?.population.id ?? null;
  return { drawn: pack(asDrawn({ inputs, result })), populationId };
}

/**
 * A run for a page.
 *
 * @param analysis of the run, as the actor may read it
 * @throws NotFound for a run that this collaboration does not have
 */
export async function drawnRun(
  actor: Actor,
  { id, key, name }: Pick<AnalysisView, 'id' | 'key' | 'name'>,
  summary: RunSummary,
): Promise<PackedRun> {
  const facts = await findRunRecord(actor, summary.id);
  const run = { ...summary, analysis: { id, key, name }, ...facts };
  const place = `${run.id} ${run.inputsDigest} ${run.resultDigest}`;
  const before = kept.get(place);
  if (before) return { ...run, ...before };
  const packed = await readDrawn(actor, run.id);
  if (run.inputsDigest !== null && run.resultDigest !== null) keep(place, packed);
  return { ...run, ...packed };
}
