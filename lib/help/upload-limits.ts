import { uploadLimits } from '@/lib/formats/limits';

const MEBIBYTE = 2 ** 20;
const count = (value: number) => value.toLocaleString('en-GB');

const mebibytes = (bytes: number) =>
  bytes >= 1024 * MEBIBYTE ? `${bytes / (1024 * MEBIBYTE)} GiB` : `${bytes / MEBIBYTE} MiB`;

/** What a person meets first of the table of limits, in words. */
export function uploadLimitWords(): string {
  const limits = uploadLimits;
  return [
    `${mebibytes(limits.uploadBytes)} (${mebibytes(limits.unpackedBytes)} unpacked, ${count(limits.archiveEntries)} files in an archive)`,
    `${count(limits.tableRows)} rows and ${limits.tableColumns} columns of a table`,
    `${count(limits.cellCharacters)} characters a cell and ${limits.nameCharacters} a name`,
    `maps of ${limits.mapSideMin} to ${limits.mapSideMax} nodes a side for ${count(limits.mapTargets)} targets`,
    `${count(limits.systemRows)} rows of systems`,
    `${limits.parseSeconds} seconds of reading`,
    `${mebibytes(limits.collaborationBytes)} and ${count(limits.collaborationUploads)} files a collaboration`,
  ].join('; ');
}
