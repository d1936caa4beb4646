import { sortFiles } from './pack';

/** A person as a bundle names them. */
export interface CrateAuthor {
  name: string;
  affiliation?: string;
  /** With hyphens, without its address. */
  orcid?: string;
}

export interface CrateFile {
  name: string;
  mediaType: string;
  description: string;
  byteLength: number;
  sha256: string;
}

/** One computation: what went in, what came out, when and by whom it was asked for. */
export interface CrateRun {
  id: string;
  name: string;
  /** Paths inside the archive. */
  inputs: string[];
  results: string[];
  by: string | null;
  startTime: string;
  endTime: string;
}

export interface CrateFacts {
  name: string;
  description: string;
  /** ISO 8601. */
  datePublished: string;
  /** Address of the licence, or a place in this file, and its name. */
  licence: { id: string; name: string };
  /** Address of the release, where it has one. */
  url?: string;
  authors: CrateAuthor[];
  software: { name: string; version: string };
  runs: CrateRun[];
  files: CrateFile[];
}

type Entity = Record<string, unknown>;
const ref = (id: string) => ({ '@id': id });

const idOfAuthor = ({ orcid }: CrateAuthor, index: number) =>
  orcid === undefined ? `#author-${index + 1}` : `https://orcid.org/${orcid}`;

function authorEntities(authors: CrateAuthor[]): Entity[] {
  return authors.flatMap((author, i) => {
    const organisation = `#affiliation-${i + 1}`;
    const person: Entity = { '@id': idOfAuthor(author, i), '@type': 'Person', name: author.name };
    if (author.affiliation === undefined) return [person];
    return [
      { ...person, affiliation: ref(organisation) },
      { '@id': organisation, '@type': 'Organization', name: author.affiliation },
    ];
  });
}

function actionEntities(run: CrateRun): Entity[] {
  const agent = `#agent-${run.id}`;
  return [
    {
      '@id': `#run-${run.id}`,
      '@type': 'CreateAction',
      name: run.name,
      instrument: ref('#software'),
      object: run.inputs.map(encodeURI).map(ref),
      result: run.results.map(encodeURI).map(ref),
      ...(run.by !== null && { agent: ref(agent) }),
      startTime: run.startTime,
      endTime: run.endTime,
    },
    ...(run.by !== null ? [{ '@id': agent, '@type': 'Person', name: run.by }] : []),
  ];
}

/**
 * ro-crate-metadata.json: what is in the archive, who made it, and by which computation.
 *
 * @source RO-Crate Metadata Specification 1.2, https://w3id.org/ro/crate/1.2
 */
export function writeCrate(facts: CrateFacts): string {
  const files = sortFiles(facts.files);
  const graph: Entity[] = [
    {
      '@id': 'ro-crate-metadata.json',
      '@type': 'CreativeWork',
      conformsTo: ref('https://w3id.org/ro/crate/1.2'),
      about: ref('./'),
    },
    {
      '@id': './',
      '@type': 'Dataset',
      name: facts.name,
      description: facts.description,
      datePublished: facts.datePublished,
      license: ref(facts.licence.id),
      ...(facts.url !== undefined && { url: facts.url }),
      author: facts.authors.map(idOfAuthor).map(ref),
      hasPart: files.map(({ name }) => ref(encodeURI(name))),
      mentions: facts.runs.map(({ id }) => ref(`#run-${id}`)),
    },
    { '@id': facts.licence.id, '@type': 'CreativeWork', name: facts.licence.name },
    ...authorEntities(facts.authors),
    {
      '@id': '#software',
      '@type': 'SoftwareApplication',
      name: facts.software.name,
      softwareVersion: facts.software.version,
    },
    ...facts.runs.flatMap(actionEntities),
    ...files.map(
      (file): Entity => ({
        '@id': encodeURI(file.name),
        '@type': 'File',
        name: file.name,
        description: file.description,
        encodingFormat: file.mediaType,
        contentSize: String(file.byteLength),
        sha256: file.sha256,
      }),
    ),
  ];
  const crate = { '@context': 'https://w3id.org/ro/crate/1.2/context', '@graph': graph };
  return `${JSON.stringify(crate, null, 1)}\n`;
}
