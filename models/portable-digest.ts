import type { BundleExpectation } from '@/lib/schemas/bundles';
import { canonicalJson, digestOf, sha256Hex } from './digest';
import type { RunRow } from './run';

const ID = /"[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}"/g;

/**
 * The digest of a value in which each id is replaced by its place among those that came before: two
 * databases that give the same things other ids agree on it.
 */
function digestWithoutIds(value: unknown): string {
  const places = new Map<string, number>();
  const text = canonicalJson(value).replace(ID, (id) => {
    const place = places.get(id) ?? places.size + 1;
    places.set(id, place);
    return `"#${place}"`;
  });
  return sha256Hex(text);
}

type Finished = Pick<RunRow, 'recipe' | 'inputs' | 'result'>;

/**
 * Fingerprints of a finished run that do not depend on the ids and the numbers of its database, nor
 * on which engine made its maps: that shows in the result.
 */
export function portableDigests({ recipe, inputs, result }: Finished) {
  if (!inputs || !result) throw new Error('a run without a result has no digest');
  const { population, sample, storedCombination, surveys, mapEngines: _, ...rest } = inputs;
  return {
    portableInputs: digestWithoutIds({
      ...rest,
      recipe,
      // Digests of definitions that hold ids of surveys, and numbers that another may have taken.
      population: { name: population.name, digest: population.digest },
      sample: sample && { name: sample.name, words: sample.words },
      storedCombination: storedCombination && {
        name: storedCombination.name,
        words: storedCombination.words,
      },
      surveys: surveys.map(({ id, name, entries }) => ({ id, name, entries })),
    }),
    portableResult: digestWithoutIds(result),
  };
}

/** What a run must give again, wherever it is made. */
export function expectationOf(run: Finished): BundleExpectation {
  const { recipe, inputs, result } = run;
  if (!inputs || !result) throw new Error('a run without a result expects nothing');
  return {
    inputsDigest: digestOf({ recipe, inputs }),
    resultDigest: digestOf(result),
    ...portableDigests(run),
    limit: result.answer.limit,
  };
}
