import type { CrateAuthor } from './ro-crate';

export interface CitedRelease {
  key: string;
  title: string;
  authors: CrateAuthor[];
  year: number;
  /** "release R-4". */
  version: string;
  /** SHA-256 of what is cited. */
  fingerprint: string;
  address: string;
  /** Of its copy in an open repository. */
  doi?: string;
}

const FINGERPRINT_LENGTH = 12;

/** Letters that mean something to TeX, written so that they are printed. */
const escapeTex = (text: string) =>
  text
    .replace(/[\\{}]/g, (found) => (found === '\\' ? '\\textbackslash{}' : `\\${found}`))
    .replace(/[&%$#_]/g, (found) => `\\${found}`)
    .replace(/~/g, '\\textasciitilde{}')
    .replace(/\^/g, '\\textasciicircum{}');

/** One line for a list of references. */
export function citeAsText(cited: CitedRelease): string {
  const names = cited.authors.map(({ name }) => name);
  const who =
    names.length > 6
      ? `${names.slice(0, 3).join(', ')} and ${names.length - 3} others`
      : names.join(', ');
  const fingerprint = cited.fingerprint.slice(0, FINGERPRINT_LENGTH);
  return `${who} (${cited.year}): ${cited.title}, ${cited.version}, fingerprint ${fingerprint}. ${cited.address}${cited.doi === undefined ? '' : `, https://doi.org/${cited.doi}`}`;
}

/** The same as BibTeX; iDs of the authors stand in the note. */
export function citeAsBibtex(cited: CitedRelease): string {
  const orcids = cited.authors.flatMap(({ name, orcid }) =>
    orcid === undefined ? [] : [`${escapeTex(name)}: https://orcid.org/${orcid}`],
  );
  const note = [`SHA-256 ${cited.fingerprint}`, ...orcids].join('; ');
  const fields: [string, string][] = [
    ['author', cited.authors.map(({ name }) => `{${escapeTex(name)}}`).join(' and ')],
    ['title', `{${escapeTex(cited.title)}}`],
    ['year', String(cited.year)],
    ['version', escapeTex(cited.version)],
    ['howpublished', `\\url{${cited.address}}`],
    ...(cited.doi === undefined ? [] : [['doi', cited.doi] as [string, string]]),
    ['note', note],
  ];
  const lines = fields.map(([name, value]) => `  ${name} = {${value}}`);
  return `@misc{${cited.key},\n${lines.join(',\n')}\n}\n`;
}
