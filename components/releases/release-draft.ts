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
