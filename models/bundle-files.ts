import type { ZodType } from 'zod';
import { InputError } from '@/lib/errors';
import {
  type BundleContent,
  bundleInputs,
  bundleRecipeSchema,
  bundleResultSchema,
} from '@/lib/schemas/bundles';
import { canonicalJson, digestOf, sha256Hex } from './digest';

/** One JSON file may hold this much text. */
const MOST_JSON_BYTES = 64 * 2 ** 20;
const DEEPEST = 40;

const asLines = (rows: readonly unknown[]) =>
  rows.length === 0 ? '[]\n' : `[\n${rows.map(canonicalJson).join(',\n')}\n]\n`;

/** The files of a bundle's run that are enough to compute it again, by their paths. */
export function writeContent(content: BundleContent): Map<string, Buffer> {
  const { recipe, stars, targets, curves, companions, coolingTables, maps, result } = content;
  const texts: [string, string][] = [
    ['recipe.json', `${JSON.stringify(JSON.parse(canonicalJson(recipe)), null, 1)}\n`],
    ['inputs/stars.json', asLines(stars)],
    ['inputs/targets.json', asLines(targets)],
    ['inputs/curves.json', asLines(curves)],
    ['inputs/companions.json', asLines(companions)],
    ['inputs/cooling-tables.json', asLines(coolingTables)],
    ['inputs/maps.json', asLines(maps)],
    ['results/result.json', `${canonicalJson(result)}\n`],
  ];
  return new Map(texts.map(([name, text]) => [name, Buffer.from(text, 'utf8')]));
}

/** Nesting beyond what any of our files has is refused before it is parsed. */
function refuseDepth(text: string, item: string): void {
  let depth = 0;
  let isText = false;
  for (let i = 0; i < text.length; i += 1) {
    const code = text.charCodeAt(i);
    if (isText) {
      if (code === 92) i += 1;
      else if (code === 34) isText = false;
    } else if (code === 34) isText = true;
    else if (code === 91 || code === 123) depth += 1;
    else if (code === 93 || code === 125) depth -= 1;
    if (depth > DEEPEST) {
      const expected = `at most ${DEEPEST} levels`;
      throw new InputError({ code: 'too-deep', item, found: 'deeper nesting', expected });
    }
  }
}

function readJson<T>(files: ReadonlyMap<string, Buffer>, path: string, schema: ZodType<T>): T {
  const item = `entry "${path}"`;
  const bytes = files.get(path);
  if (!bytes) {
    throw new InputError({ code: 'no-entry', item, message: 'is not in the bundle; it is needed' });
  }
  if (bytes.length > MOST_JSON_BYTES) {
    throw new InputError({ code: 'too-large', item, message: 'has more than 64 MiB' });
  }
  let text: string;
  let value: unknown;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    refuseDepth(text, item);
    value = JSON.parse(text);
  } catch (reason) {
    if (reason instanceof InputError) throw reason;
    throw new InputError({ code: 'json', item, found: 'text that is no JSON', expected: 'JSON' });
  }
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  throw new InputError({
    code: 'shape',
    item: `${item}, ${issue.path.join('.') || 'its root'}`,
    found: 'another shape',
    expected: issue.message,
  });
}

/** The runs that a bundle holds: the folder of each. */
export function runsInBundle(files: ReadonlyMap<string, Buffer>): string[] {
  return [...files.keys()]
    .filter((path) => path.endsWith('/recipe.json') && path.split('/').length === 2)
    .map((path) => path.split('/')[0])
    .sort();
}

/**
 * Reads one run of a bundle and holds each digest that it states against what it holds.
 *
 * @param folder "A-31-run-18"
 * @throws InputError that names the file and the place
 */
export function readContent(files: ReadonlyMap<string, Buffer>, folder: string): BundleContent {
  const read = <T>(name: string, schema: ZodType<T>) =>
    readJson(files, `${folder}/${name}`, schema);
  const content: BundleContent = {
    recipe: read('recipe.json', bundleRecipeSchema),
    stars: read('inputs/stars.json', bundleInputs['stars.json']),
    targets: read('inputs/targets.json', bundleInputs['targets.json']),
    curves: read('inputs/curves.json', bundleInputs['curves.json']),
    companions: read('inputs/companions.json', bundleInputs['companions.json']),
    coolingTables: read('inputs/cooling-tables.json', bundleInputs['cooling-tables.json']),
    maps: read('inputs/maps.json', bundleInputs['maps.json']),
    result: read('results/result.json', bundleResultSchema),
  };
  checkDigests(content);
  checkReferences(content);
  return content;
}

function demandSame(what: string, stated: string, computed: string): void {
  if (stated === computed) return;
  throw new InputError({
    code: 'checksum',
    item: what,
    found: `a digest that begins with ${stated.slice(0, 12)}`,
    expected: `${computed.slice(0, 12)}, which its numbers give`,
  });
}

function checkDigests({ recipe, curves, coolingTables, maps, result }: BundleContent): void {
  const { population, sample, combination } = recipe;
  demandSame('the population', population.digest, digestOf(population.definition));
  if (sample) demandSame('the sample', sample.digest, digestOf(sample.definition));
  if (combination) {
    demandSame('the combination', combination.digest, digestOf(combination.definition));
  }
  for (const { band, epoch, nSigma, separationArcsec, contrastMag, coverage, digest } of curves) {
    const own = digestOf({ band, epoch, nSigma, separationArcsec, contrastMag, coverage });
    demandSame('a contrast curve', digest, own);
  }
  for (const { name, massMjup, ageMyr, magnitudes, digest } of coolingTables) {
    demandSame(`the cooling table ${name}`, digest, digestOf({ massMjup, ageMyr, magnitudes }));
  }
  for (const map of maps) {
    const values = Buffer.from(map.nodeValues, 'base64');
    demandSame('a completeness map', map.checksum, sha256Hex(values));
    if (values.length !== 2 * map.massMjup.length * map.semiMajorAxisAu.length) {
      const message = 'a completeness map has more or fewer values than its axes';
      throw new InputError({ code: 'shape', message });
    }
  }
  demandSame('the result', recipe.expected.resultDigest, digestOf(result));
}

/** Every id that something names must be there: a bundle is whole. */
function checkReferences(content: BundleContent): void {
  const { recipe, stars, targets, curves, companions, maps } = content;
  const lacks = (what: string) => {
    throw new InputError({
      code: 'reference',
      item: what,
      found: 'the id of something that the bundle does not hold',
      expected: 'everything that it names to be in it',
    });
  };
  const known = (rows: readonly { id: string }[]) => new Set(rows.map(({ id }) => id));
  const [surveyIds, starIds, targetIds] = [known(recipe.surveys), known(stars), known(targets)];
  const mapDigests = new Set(maps.map(({ digest }) => digest));
  if (recipe.recipe.surveyIds.some((id) => !surveyIds.has(id))) lacks('the recipe');
  if (recipe.recipe.populationId !== recipe.population.id) lacks('the recipe');
  if ((recipe.recipe.sampleId ?? null) !== (recipe.sample?.id ?? null)) lacks('the recipe');
  if ((recipe.recipe.combinationId ?? null) !== (recipe.combination?.id ?? null)) {
    lacks('the recipe');
  }
  for (const { name, surveyId, starId, mapDigest } of targets) {
    const isWhole = surveyIds.has(surveyId) && starIds.has(starId);
    if (!isWhole || (mapDigest !== null && !mapDigests.has(mapDigest))) lacks(`target ${name}`);
  }
  if (curves.some(({ targetId }) => !targetIds.has(targetId))) lacks('a contrast curve');
  if (companions.some(({ targetId }) => !targetIds.has(targetId))) lacks('a companion');
  const tables = known(content.coolingTables);
  for (const { name, mapSettings } of recipe.surveys) {
    const { cooling } = mapSettings;
    if (cooling.kind !== 'built-in' && !tables.has(cooling.coolingTableId)) lacks(`survey ${name}`);
  }
}
