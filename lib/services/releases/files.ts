import { type CitedRelease, citeAsBibtex, citeAsText } from '@/lib/formats/bundle';
import type { Author } from '@/lib/schemas/releases';
import { defaultOptions, findRunExport } from '../exports/registry';
import { asBuffer, type BundledRun, writeBundle } from './bundle';

/** A release as its files name it. */
export interface ReleaseToWrite {
  key: string;
  number: number;
  title: string;
  authors: Author[];
  abstract: string;
  licence: 'CC-BY-4.0' | 'CC-BY-SA-4.0' | 'CC0-1.0' | 'ODC-By-1.0';
  address: string;
  publishedAt: Date;
  runs: BundledRun[];
}

export interface ReleaseFile {
  name: string;
  mediaType: string;
  description: string;
  bytes: Buffer;
}

/** One entry of what a release gives out; some are made once a run, some once. */
interface ReleaseFileMaker {
  /** Ends the file's name; those of a run begin with the run's folder. */
  name: string;
  of: 'run' | 'release';
  make(release: ReleaseToWrite, run: BundledRun): Promise<Omit<ReleaseFile, 'name'> | null>;
}

export function citedRelease(release: ReleaseToWrite): CitedRelease {
  const [first] = release.runs;
  return {
    key: `rarebound-${release.address.split('/').at(-1)}`,
    title: release.title,
    authors: release.authors,
    year: release.publishedAt.getUTCFullYear(),
    version: `release ${release.key}`,
    fingerprint: first.run.resultDigest,
    address: release.address,
  };
}

/** What every finished run offers, under the same name. */
const offered = (name: string): ReleaseFileMaker => ({
  name,
  of: 'run',
  async make(_release, { run }) {
    const offer = findRunExport(name);
    if (!offer) return null;
    const written = await offer.make(run, defaultOptions);
    const parts: Uint8Array[] = [];
    for await (const part of written.parts()) parts.push(part);
    return { mediaType: offer.mediaType, description: offer.what, bytes: Buffer.concat(parts) };
  },
});

/**
 * Every file of a release. A further one is a line here: whatever a finished run offers by its name,
 * or a maker of its own.
 */
const makers: readonly ReleaseFileMaker[] = [
  offered('limits.csv'),
  offered('limits.ecsv'),
  offered('limits.vot'),
  offered('limits.tex'),
  offered('posterior.csv'),
  offered('targets.csv'),
  offered('companions.csv'),
  offered('maps.fits'),
  offered('methods.txt'),
  offered('methods.tex'),
  offered('references.bib'),
  {
    name: 'statement.json',
    of: 'run',
    make: async (_release, { run }) => ({
      mediaType: 'application/json',
      description: 'The limit as a sentence with its conditions',
      bytes: asBuffer(
        `${JSON.stringify({ ...run.result.statement, resultDigest: run.resultDigest }, null, 1)}\n`,
      ),
    }),
  },
  {
    name: 'CITATION.bib',
    of: 'release',
    make: async (release) => ({
      mediaType: 'application/x-bibtex; charset=utf-8',
      description: 'Citation',
      bytes: asBuffer(citeAsBibtex(citedRelease(release))),
    }),
  },
  {
    name: 'CITATION.txt',
    of: 'release',
    make: async (release) => ({
      mediaType: 'text/plain; charset=utf-8',
      description: 'Citation',
      bytes: asBuffer(`${citeAsText(citedRelease(release))}\n`),
    }),
  },
  {
    name: 'bundle.zip',
    of: 'release',
    make: async (release) => ({
      mediaType: 'application/zip',
      description: 'Inputs, results and recipe, to compute it again',
      bytes: await writeBundle(
        {
          name: release.title,
          description:
            release.abstract ||
            release.runs.map(({ run }) => run.result.statement.sentence).join('. '),
          state: `Release ${release.key}, ${release.publishedAt.toISOString().slice(0, 10)}.`,
          datePublished: release.publishedAt.toISOString().slice(0, 10),
          licence: release.licence,
          url: release.address,
          authors: release.authors,
          bibtex: citeAsBibtex(citedRelease(release)),
        },
        release.runs,
      ),
    }),
  },
];

/** Makes every file of a release, in the order in which its page lists them. */
export async function makeReleaseFiles(release: ReleaseToWrite): Promise<ReleaseFile[]> {
  const files: ReleaseFile[] = [];
  for (const run of release.runs) {
    for (const maker of makers.filter(({ of }) => of === 'run')) {
      const made = await maker.make(release, run);
      if (made) files.push({ name: `${run.folder}-${maker.name}`, ...made });
    }
  }
  for (const maker of makers.filter(({ of }) => of === 'release')) {
    const made = await maker.make(release, release.runs[0]);
    if (made) files.push({ name: `${release.key}-${maker.name}`, ...made });
  }
  return files;
}
