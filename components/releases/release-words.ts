import type { StateKind } from '@/components/ui/state-mark';
import { formatPlain } from '@/lib/quantities/display';
import type { ReleaseState } from '@/lib/schemas/releases';

export const stateWords: Record<ReleaseState, { kind: StateKind; words: string }> = {
  draft: { kind: 'draft', words: 'draft' },
  checking: { kind: 'running', words: 'run again from its inputs' },
  mismatch: { kind: 'bad', words: 'stopped: other numbers' },
  failed: { kind: 'bad', words: 'check failed' },
  checked: { kind: 'ok', words: 'ready to publish' },
  published: { kind: 'released', words: 'published' },
  withdrawn: { kind: 'stopped', words: 'withdrawn' },
};

/** Of a limit whose sentence says the ranges: the prior, and what counted. */
export const furtherGround = ({ prior, detections }: { prior: string; detections: string }) =>
  `${detections}; prior ${prior}`;

/** "18 MB", "4.2 kB". */
export function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  const [value, unit] = bytes < 1e6 ? [bytes / 1e3, 'kB'] : [bytes / 1e6, 'MB'];
  return `${value < 10 ? formatPlain(value, 2) : Math.round(value)} ${unit}`;
}

const formats: Record<string, string> = {
  csv: 'CSV',
  ecsv: 'ECSV',
  vot: 'VOTable',
  tex: 'LaTeX',
  txt: 'Text',
  bib: 'BibTeX',
  json: 'JSON',
  fits: 'FITS',
  zip: 'ZIP',
};

/** "VOTable", by a file's ending. */
export const formatOf = (name: string) => {
  const ending = name.slice(name.lastIndexOf('.') + 1);
  return formats[ending] ?? ending.toUpperCase();
};

/** "9d37·51aa·e2f4": enough to compare by eye. */
export const shortDigest = (digest: string) =>
  [0, 4, 8].map((at) => digest.slice(at, at + 4)).join('·');

/** Where a file of a published release is had. */
export const fileAddress = (code: string, name: string) =>
  `/api/v1/releases/${encodeURIComponent(code)}/files/${encodeURIComponent(name)}`;
