import type { RatePriorInput } from './analyses';
import type { ListedDefinition } from './populations';
import type { Author, Licence, ReleaseCheck } from './releases';
import type { DetectionView, RunResult } from './runs';

/** What a page shows of one frozen run. */
export interface ShownRun {
  id: string;
  name: string;
  result: Omit<RunResult, 'starTable' | 'depth'>;
  population: ListedDefinition;
  surveys: string[];
  companions: DetectionView[];
  cooling: string;
  /** Masses stay empty where they differ from star to star. */
  range: {
    massMinMjup: number | null;
    massMaxMjup: number | null;
    semiMajorAxisMinAu: number | null;
    semiMajorAxisMaxAu: number | null;
  };
  prior: RatePriorInput;
  frozenBy: string;
  frozenAt: string;
  reason: string | null;
  inputsDigest: string;
  resultDigest: string;
  snapshotSha256: string;
  methods: { text: string; latex: string };
  /** Answers of further questions of the same run, which are no part of the release. */
  alternatives: { kind: string; name: string; headline: string }[];
}

export interface ReleasePage {
  kind: 'release' | 'run';
  key: string;
  title: string;
  collaboration: string;
  authors: Author[];
  abstract: string;
  note: string;
  licence: Licence | null;
  address: string | null;
  /** Draft until it is published. */
  publishedAt: string | null;
  signedOff: { by: string; at: string } | null;
  agreed: { by: string; at: string } | null;
  published: { by: string; at: string } | null;
  verification: ReleaseCheck | null;
  withdrawn: { at: string; reason: string } | null;
  replaces: { key: string; code: string } | null;
  replacedBy: { key: string; code: string } | null;
  files: {
    name: string;
    description: string;
    mediaType: string;
    byteLength: number;
    sha256: string;
  }[];
  /** Its copy in an open repository; one for practice has an identifier that leads nowhere. */
  deposit?: { doi: string; address: string | null; isPractice: boolean } | null;
  citation: { text: string; bibtex: string } | null;
  /** None where it was withdrawn. */
  runs: ShownRun[];
}

/** The same for whoever holds a link. */
export interface GuestPage extends ReleasePage {
  guest: {
    label: string;
    expiresAt: string;
    notes: { id: string; name: string; body: string; at: string }[];
  };
}
