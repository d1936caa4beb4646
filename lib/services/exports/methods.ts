import { latexProse } from '@/lib/formats';
import { citeAsBibtex } from '@/lib/formats/bundle';
import { writeBibtexEntry } from '@/lib/formats/write-bibtex';
import { citedReferences, type MethodsPart, methodsParagraph } from '@/lib/inference/methods-text';
import { type ReferenceKey, references } from '@/lib/inference/references';
import { countedDetections, countingRule, type FinishedRun, stateOf } from '../export-limits';
import { SOFTWARE } from './software';

/** The paragraph of a run as words and citations. */
export function paragraphOfRun(run: FinishedRun): MethodsPart[] {
  const { inputs, result, recipe } = run;
  const counted =
    result.quantity === 'host_fraction'
      ? result.counted.filter(({ name }) => !result.mergedNames.includes(name))
      : result.counted;
  return methodsParagraph({
    name: `${run.analysis} run ${run.number}, ${stateOf(run)}`,
    surveys: inputs.surveys,
    stars: result.stars,
    leftOut: inputs.leftOut.length,
    combination: inputs.combination,
    cooling: inputs.cooling,
    eccentricity: inputs.eccentricity,
    threshold: inputs.threshold,
    sample: inputs.sample ? `${inputs.sample.name} (${inputs.sample.words})` : null,
    population: run.population,
    prior: recipe.prior,
    quantity: result.quantity,
    credibleLevel: result.credibleLevel,
    counted: counted.map(({ name }) => name),
    countingRule: countingRule(run, false, result.quantity),
    candidates: result.candidates,
    background: result.background,
    exposure: result.exposure,
    answer: result.answer,
    zeroLimit:
      countedDetections(run, false, result.quantity) > 0 && result.zero.isConstrained
        ? result.zero.limit
        : null,
    beside: result.beside?.rows ?? [],
    software: SOFTWARE,
    engineVersion: run.engineVersion,
    resultDigest: run.resultDigest,
  });
}

type CiteStyle = (keys: ReferenceKey[]) => string;

const styles = {
  txt: (keys) => `(${keys.map((key) => references[key].short).join('; ')})`,
  md: (keys) => `[${keys.map((key) => `@${key}`).join('; ')}]`,
  tex: (keys) => `\\citep{${keys.join(',')}}`,
} as const satisfies Record<string, CiteStyle>;

/** In Markdown these would begin a citation, a link or emphasis. */
const escapeMarkdown = (text: string) => text.replace(/[\\`*_[\]<>@#]/g, '\\$&');

const asIs = (text: string) => text;
const escapes = { txt: asIs, md: escapeMarkdown, tex: latexProse } as const;

/** The methods paragraph as text, Markdown or LaTeX; its citation keys are those of the BibTeX file. */
export function writeMethods(run: FinishedRun, style: keyof typeof styles): string {
  const parts = paragraphOfRun(run).map((part) =>
    typeof part === 'string' ? escapes[style](part) : styles[style](part.cite),
  );
  return `${parts.join('')}\n`;
}

/** One BibTeX entry per paper that the paragraph cites, and one for the release. */
export function writeReferences(run: FinishedRun): string {
  const entries = citedReferences(paragraphOfRun(run)).map((key) =>
    writeBibtexEntry('article', key, references[key].fields),
  );
  const { release } = run;
  if (release) {
    entries.push(
      citeAsBibtex({
        key: `${run.analysis}-release-${release.version}`,
        title: release.title,
        authors: release.authors.map(({ name, orcid }) => ({ name, ...(orcid && { orcid }) })),
        year: release.year,
        version: `version ${release.version}`,
        fingerprint: release.checksum ?? run.resultDigest,
        address: release.address,
      }),
    );
  }
  return entries.join('\n');
}
