import type { Readable } from 'node:stream';

/** What a repository is told of a release. */
export interface DepositMetadata {
  /** The release's public address: the repository finds a draft by it that we have forgotten. */
  identifier: string;
  title: string;
  description: string;
  creators: { name: string; affiliation?: string; orcid?: string }[];
  /** ISO date. */
  publicationDate: string;
  version: string;
  /** Address of the licence. */
  licence: string;
  /** DOI or address of what this one takes the place of. */
  replaces?: string;
}

export interface DepositedFile {
  name: string;
  byteLength: number;
  /** Hex. */
  sha256: string;
}

export interface FileToDeposit extends DepositedFile {
  mediaType: string;
  /** The bytes from the beginning, each time that it is called. */
  open(): Readable;
}

/** How a deposit stands at the repository. */
export interface RemoteDeposit {
  id: string;
  state: 'draft' | 'published';
  doi: string | null;
  /** Its page there, once it is published. */
  address: string | null;
  files: DepositedFile[];
}

/**
 * An open repository. Every step may be taken again after it was taken already, by whoever does not
 * know whether it was: the answer is then the one of the first time.
 */
export interface Repository {
  /** Where it is, for a sentence. */
  name: string;
  /** The draft that carries the identifier, or a new one. */
  createDraft(metadata: DepositMetadata): Promise<RemoteDeposit>;
  reserveDoi(id: string): Promise<string>;
  /** Takes the place of a file of this name. @throws LabError where it does not arrive whole */
  uploadFile(id: string, file: FileToDeposit): Promise<void>;
  publish(id: string): Promise<RemoteDeposit>;
  /** Null where nothing has this id any more. */
  find(id: string): Promise<RemoteDeposit | null>;
}
