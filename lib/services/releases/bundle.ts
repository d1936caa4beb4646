import { type BundleFile, packFiles, writeCrate } from '@/lib/formats/bundle';
import { type Licence, licences } from '@/lib/schemas/releases';
import { sha256Hex } from '@/models/digest';
import type { FinishedRun } from '../export-limits';
import { defaultOptions, findRunExport } from '../exports/registry';
import { SOFTWARE_VERSION } from '../exports/software';

/** One run of a bundle: the files that are enough to compute it again, and what its tables need. */
export interface BundledRun {
  /** "A-31-run-18": its folder. */
  folder: string;
  run: FinishedRun;
  /** From its recipe. */
  by: string | null;
  startedAt: string;
  /** Paths below the folder. */
  content: ReadonlyMap<string, Buffer>;
}

const words: Record<string, string> = {
  'recipe.json': 'The question: populations, prior, filters, settings, seed, digests',
  'inputs/stars.json': 'Stars, each once',
  'inputs/targets.json': 'Targets as each survey lists them',
  'inputs/curves.json': 'Contrast curves: arcsec, mag at n sigma',
  'inputs/companions.json': 'Candidates and companions with their verdicts',
  'inputs/cooling-tables.json': 'Cooling relations: absolute magnitude by mass and age',
  'inputs/maps.json': 'Completeness maps that were brought in ready',
  'results/result.json': 'The whole result as it is stored',
};

/** Tables for people, beside the files that are read again: name in the run's offers → path. */
const tables = {
  'limits.csv': 'results/limits.csv',
  'posterior.csv': 'results/posterior.csv',
  'methods.txt': 'results/methods.txt',
  'targets.csv': 'tables/targets.csv',
  'companions.csv': 'tables/companions.csv',
} as const;

export const asBuffer = (text: string) => Buffer.from(text, 'utf8');

async function makeTable(run: FinishedRun, name: string) {
  const offer = findRunExport(name);
  if (!offer) return null;
  const written = await offer.make(run, defaultOptions);
  const parts: Uint8Array[] = [];
  for await (const part of written.parts()) parts.push(part);
  return { offer, bytes: Buffer.concat(parts) };
}

async function filesOfRun({ folder, run, content }: BundledRun): Promise<BundleFile[]> {
  const files: BundleFile[] = [...content].map(([path, bytes]) => ({
    name: `${folder}/${path}`,
    mediaType: 'application/json',
    description: words[path] ?? path,
    bytes,
  }));
  for (const [name, path] of Object.entries(tables)) {
    const made = await makeTable(run, name);
    if (!made) continue;
    const { what: description, mediaType } = made.offer;
    files.push({ name: `${folder}/${path}`, mediaType, description, bytes: made.bytes });
  }
  const { statement } = run.result;
  files.push({
    name: `${folder}/results/statement.json`,
    mediaType: 'application/json',
    description: 'The limit as a sentence with its conditions',
    bytes: asBuffer(
      `${JSON.stringify({ ...statement, resultDigest: run.resultDigest }, null, 1)}\n`,
    ),
  });
  return files;
}

function writeReadme(facts: BundleFacts, runs: readonly BundledRun[]): string {
  return `${[
    facts.name,
    facts.state,
    '',
    facts.description,
    '',
    ...runs.flatMap(({ folder, run }) => [
      `${folder}/`,
      `  ${run.result.statement.sentence}`,
      `  result SHA-256 ${run.resultDigest}`,
    ]),
    '',
    'What is here',
    '  ro-crate-metadata.json  what each file is, by whom, from which computation (RO-Crate 1.2)',
    '  checksums.txt           SHA-256 of every other file, as sha256sum reads it',
    '  CITATION.bib            how to cite it',
    '  <run>/recipe.json       the question, with the digests that its answer must have',
    '  <run>/inputs/           targets, curves, companions, cooling relations, ready maps: JSON with',
    '                          the unit in each name; numbers are the shortest that read back alike',
    '  <run>/results/          limits and posterior as CSV, the statement, the whole result',
    '  <run>/tables/           targets and companions as CSV, for reading; inputs/ is what counts',
    '',
    'How to compute it again',
    '  In Rarebound, open Releases, then "Bring in a bundle", and give it this archive. Surveys,',
    '  population and analysis are made from inputs/ and recipe.json, every map is computed from its',
    '  curve, and the run follows. Its page says whether both fingerprints agree.',
    `  Made with the engine of version ${runs[0].run.engineVersion}; another version may differ in`,
    '  the last digits.',
    '',
  ].join('\n')}`;
}

export interface BundleFacts {
  name: string;
  description: string;
  /** "Draft, run 18: …", "Frozen, run 18, …", "Release R-4." */
  state: string;
  datePublished: string;
  licence: Licence | null;
  url?: string;
  authors: { name: string; affiliation?: string; orcid?: string }[];
  bibtex: string;
}

const licenceOf = (licence: Licence | null) =>
  licence === null
    ? { id: '#no-licence', name: 'No licence is stated: this is not a release' }
    : { id: licences[licence], name: licence };

/** The archive: the same bytes whenever it is made of the same release. */
export async function writeBundle(
  facts: BundleFacts,
  runs: readonly BundledRun[],
): Promise<Buffer> {
  const files: BundleFile[] = [];
  for (const run of runs) files.push(...(await filesOfRun(run)));
  files.push(
    {
      name: 'CITATION.bib',
      mediaType: 'application/x-bibtex',
      description: 'How to cite it',
      bytes: asBuffer(facts.bibtex),
    },
    {
      name: 'README.txt',
      mediaType: 'text/plain',
      description: 'What is here and how to compute it again',
      bytes: asBuffer(writeReadme(facts, runs)),
    },
  );
  const crate = writeCrate({
    name: facts.name,
    description: facts.description,
    datePublished: facts.datePublished,
    licence: licenceOf(facts.licence),
    ...(facts.url !== undefined && { url: facts.url }),
    authors: facts.authors,
    software: { name: 'Rarebound', version: SOFTWARE_VERSION },
    runs: runs.map(({ folder, run, by, startedAt }) => ({
      id: folder,
      name: `${run.analysis}, run ${run.number}: ${run.result.statement.sentence}`,
      inputs: files
        .map(({ name }) => name)
        .filter((name) => name === `${folder}/recipe.json` || name.startsWith(`${folder}/inputs/`)),
      results: files
        .map(({ name }) => name)
        .filter((name) => name.startsWith(`${folder}/results/`)),
      by,
      startTime: startedAt,
      endTime: run.finishedAt ?? startedAt,
    })),
    files: files.map(({ bytes, ...file }) => ({
      ...file,
      byteLength: bytes.length,
      sha256: sha256Hex(bytes),
    })),
  });
  const described = [...files, { name: 'ro-crate-metadata.json', bytes: asBuffer(crate) }];
  const sums = described
    .map(({ name, bytes }) => `${sha256Hex(bytes)}  ${name}`)
    .sort((a, b) => (a.slice(66) < b.slice(66) ? -1 : 1));
  const checksums = { name: 'checksums.txt', bytes: asBuffer(`${sums.join('\n')}\n`) };
  return packFiles([...described, checksums]);
}
