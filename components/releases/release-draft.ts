import type { Author, ReleaseView } from '@/lib/schemas/releases';

/** What the form of a release holds. */
export interface ReleaseDraft {
  title: string;
  authors: Author[];
  abstract: string;
  licence: string;
  note: string;
  runIds: string[];
  replacesId: string | null;
}

export function draftOf(release: ReleaseView): ReleaseDraft {
  const { title, authors, abstract, licence, note, runs, replaces } = release;
  return {
    title,
    authors,
    abstract,
    licence,
    note,
    runIds: runs.map(({ id }) => id),
    replacesId: replaces?.id ?? null,
  };
}

/** Each field as words, with the names of runs and releases where they are known. */
export function draftWords(
  draft: ReleaseDraft,
  nameOf: (id: string) => string,
): Record<string, string> {
  return {
    Title: draft.title,
    'Frozen runs': draft.runIds.map(nameOf).join(', '),
    Abstract: draft.abstract,
    Note: draft.note,
    Authors: draft.authors
      .map(({ name, affiliation, orcid }) => [name, affiliation, orcid].filter(Boolean).join(', '))
      .join('; '),
    Licence: draft.licence,
    Replaces: draft.replacesId === null ? 'no earlier release' : nameOf(draft.replacesId),
  };
}

const FIELDS: Record<string, string> = {
  title: 'Title',
  authors: 'Authors',
  name: 'name',
  affiliation: 'affiliation',
  orcid: 'ORCID iD',
  abstract: 'Abstract',
  licence: 'Licence',
  note: 'Note',
  runIds: 'Frozen runs',
  replacesId: 'Replaces',
};

/** Where a fault lies, as the form names it: "Author 1, ORCID iD". */
export function placeWords([field, at, part]: readonly PropertyKey[]): string {
  const name = FIELDS[String(field)] ?? 'Form';
  if (field !== 'authors' || at === undefined) return name;
  const author = `Author ${Number(at) + 1}`;
  return part === undefined ? author : `${author}, ${FIELDS[String(part)] ?? String(part)}`;
}
