import type { Fault } from '@/lib/errors';

/** What one uploaded file may hold; the person chooses the kind and the reader checks it. */
export type UploadKind =
  | 'targets'
  | 'contrast-curves'
  | 'completeness-maps'
  | 'companions'
  | 'cooling-tables'
  | 'systems';

/** How the bytes of a file are laid out, told by the first of them. */
export type Container = 'csv' | 'ecsv' | 'votable' | 'fits' | 'npy' | 'npz' | 'hdf5' | 'json';

/** What a reader did that the person should see: a default, a conversion, something skipped. */
export interface Note {
  code: string;
  /** A warning asks for a look; information records what was read in which way. */
  level: 'information' | 'warning';
  line?: number;
  column?: string;
  /** The place where line and column do not say it: `target "RB 0001"`, `columns 2 and 3`. */
  item?: string;
  message: string;
}

/** A target's map as plain arrays, so that a context can be cloned into a worker. */
export interface KnownMap {
  /** Mass nodes [Mjup], increasing. */
  massMjup: number[];
  /** Semi-major axis nodes [AU], increasing. */
  semiMajorAxisAu: number[];
  /** Shape [mass, semiMajorAxis], row-major, 0 to 1. */
  completeness: number[];
}

export interface KnownTarget {
  name: string;
  otherNames: string[];
  id?: string;
}

/** All that a reader may know besides the bytes. Structured-clone-able. */
export interface ReadContext {
  fileName: string;
  kind: UploadKind;
  /** The survey's targets; absent: names are taken as written and not checked. */
  targetNames?: KnownTarget[];
  /** The star of a file without a `target` column: two-column curves, wide maps. */
  defaultTarget?: string;
  /** The band of a curve file without a `band` column. */
  defaultBand?: string;
  /** Bands that the cooling relation holds; absent: bands are not checked. */
  bands?: string[];
  /** Maps per target name, for the notes about companions that a map cannot count. */
  maps?: Map<string, KnownMap>;
  /** The person's choice: read unmeasured completeness as 0. */
  notMeasuredIsZero?: boolean;
  /** The person's own mapping: heading in the file to our column, or '' to ignore it. */
  columnMap?: Record<string, string>;
  /** Targets of the file that the person leaves out: their rows are not read. */
  leaveOut?: string[];
  /** The axes of a file that has none: a list, `linspace(a,b,n)` or `geomspace(a,b,n)`. */
  axes?: { mass?: string; semiMajorAxis?: string };
}

export interface Magnitude {
  valueMag: number;
  errorMag: number | null;
}

export type Multiplicity = 'single' | 'binary' | 'multiple';

/** One star as a survey lists it; null where the file says nothing. */
export interface TargetRecord {
  line: number;
  name: string;
  otherNames: string[];
  /** 1 to 19 digits, text from end to end. */
  gaiaDr3Id: string | null;
  raDeg: number | null;
  decDeg: number | null;
  refEpoch: number | null;
  pmRaMasYr: number | null;
  pmDecMasYr: number | null;
  parallaxMas: number | null;
  parallaxErrorMas: number | null;
  distancePc: number | null;
  distanceErrorPc: number | null;
  ageMyr: number | null;
  /** 16 % and 84 % points, computed from whichever error the file gives. */
  ageLowerMyr: number | null;
  ageUpperMyr: number | null;
  /** The error as stated, from which the two points above are computed. */
  ageErrorLowerMyr: number | null;
  ageErrorUpperMyr: number | null;
  logAgeErrorDex: number | null;
  /** Hard bounds. */
  ageMinMyr: number | null;
  ageMaxMyr: number | null;
  hostMassMsun: number | null;
  hostMassErrorMsun: number | null;
  spectralType: string | null;
  movingGroup: string | null;
  membershipProbability: number | null;
  magnitudes: Record<string, Magnitude>;
  multiplicity: Multiplicity | null;
  binarySemiMajorAxisAu: number | null;
  binaryEccentricity: number | null;
  binaryMassRatio: number | null;
  debrisDisk: boolean | null;
  /** The survey lists it because a companion was known: no fair draw. */
  selectedForCompanion: boolean | null;
  notes: string | null;
  reference: string | null;
}

/** One detection limit of one star, epoch and band, separations increasing. */
export interface CurveRecord {
  target: string;
  band: string;
  /** ISO 8601 date, or a Modified Julian Date as written. */
  epoch: string | null;
  nSigma: number;
  thresholdProbability: number;
  instrument: string | null;
  reference: string | null;
  separationArcsec: number[];
  /** Magnitudes fainter than the star; flux ratios are converted. */
  contrastMag: number[];
  coverage: number[] | null;
  firstLine: number;
}

export interface MapRecord {
  target: string;
  massMjup: number[];
  semiMajorAxisAu: number[];
  /** Shape [mass, semiMajorAxis], row-major. */
  completeness: number[];
  nodeKind: 'nodes' | 'cells';
}

export type CompanionStatus = 'confirmed' | 'candidate' | 'ambiguous' | 'background';

/** What was measured of a companion at one epoch. */
export type EpochRecord = Pick<
  CompanionRecord,
  | 'separationArcsec'
  | 'separationErrorArcsec'
  | 'positionAngleDeg'
  | 'positionAngleErrorDeg'
  | 'contrastMag'
  | 'contrastErrorMag'
  | 'band'
  | 'epoch'
  | 'reference'
>;

export interface CompanionRecord {
  line: number;
  target: string;
  companion: string;
  status: CompanionStatus;
  massMjup: number | null;
  massErrorLowerMjup: number | null;
  massErrorUpperMjup: number | null;
  semiMajorAxisAu: number | null;
  semiMajorAxisErrorLowerAu: number | null;
  semiMajorAxisErrorUpperAu: number | null;
  projectedSeparationAu: number | null;
  separationArcsec: number | null;
  separationErrorArcsec: number | null;
  positionAngleDeg: number | null;
  positionAngleErrorDeg: number | null;
  contrastMag: number | null;
  contrastErrorMag: number | null;
  band: string | null;
  epoch: string | null;
  eccentricity: number | null;
  commonProperMotion: 'yes' | 'no' | 'untested' | null;
  probability: number | null;
  reference: string | null;
  /** Of further rows that state the same companion at other epochs; absent where there are none. */
  furtherEpochs?: EpochRecord[];
}

export interface CoolingTableRecord {
  massMjup: number[];
  ageMyr: number[];
  /** Per band, shape [mass, age], row-major; null where the table has no entry. */
  magnitudes: Record<string, (number | null)[]>;
  /** log10 of the luminosity [Lsun], same shape; null where the file has no such column. */
  logLuminosity: (number | null)[] | null;
  /** Effective temperature [K], same shape. */
  temperatureK: (number | null)[] | null;
}

/** Planetary systems in columns; a system without companions counts. */
export interface SystemsRecord {
  /** Shape [system], >= 0; only their ratios matter. */
  weight: number[];
  /** Shape [companion]: index of its system. */
  companionSystem: number[];
  massMjup: number[];
  semiMajorAxisAu: number[];
}

/** Posterior draws of one companion, one entry per draw. */
export interface SampleRecord {
  target: string;
  companion: string;
  massMjup: number[];
  semiMajorAxisAu: number[];
  eccentricity: number[] | null;
  weight: number[] | null;
  firstLine: number;
}

export interface RecordsOfKind {
  targets: TargetRecord[];
  'contrast-curves': CurveRecord[];
  'completeness-maps': MapRecord[];
  companions: CompanionRecord[];
  'cooling-tables': CoolingTableRecord[];
  systems: SystemsRecord[];
}
export type ParsedRecords = RecordsOfKind[UploadKind];

/** How one column of the file was read. */
export interface ColumnReading {
  /** Position in the file, from 1. */
  index: number;
  heading: string;
  /** Our column name, or null where the column is ignored. */
  readAs: string | null;
  /** The unit that the values were read in, before conversion; null where there is none. */
  unit: string | null;
}

export type PreviewCell = string | number | null;

/** The beginning of a file as it was read, small enough to be sent to a screen. */
export interface Preview {
  /** The first rows in our columns and units; null where the file is no table. */
  table: { columns: { name: string; unit: string | null }[]; rows: PreviewCell[][] } | null;
  curves: {
    target: string;
    band: string;
    epoch: string | null;
    nSigma: number;
    separationArcsec: number[];
    contrastMag: number[];
  }[];
  /** Values at nodes, shape [mass, semiMajorAxis]. */
  maps: {
    target: string;
    massMjup: number[];
    semiMajorAxisAu: number[];
    completeness: number[];
  }[];
}

/** A line of a text file at fault, with the lines around it. */
export interface Excerpt {
  line: number;
  before: string | null;
  text: string;
  after: string | null;
}

/** Rows at fault with their cells as written, one entry a fault. */
export interface OffendingRows {
  headings: string[];
  rows: {
    place: string;
    cells: string[];
    column: string | null;
    code: string;
    found: string;
    expected: string;
  }[];
  /** How many there are in all; `rows` may list fewer. */
  count: number;
}

export interface ReadSuccess<K extends UploadKind> {
  ok: true;
  kind: K;
  container: Container;
  /** Which part of the container was read, such as `HDU 2`. */
  part: string | null;
  preview: Preview;
  records: RecordsOfKind[K];
  notes: Note[];
  columns: ColumnReading[];
  rowCount: number;
}

export interface ReadFailure {
  ok: false;
  kind: UploadKind;
  /** At most five of one code, then one entry "and N more like it". */
  faults: Fault[];
  faultCount: number;
  notes: Note[];
  columns: ColumnReading[];
  /** Of text files. */
  excerpts: Excerpt[];
  /** Of tables. */
  offending: OffendingRows | null;
}

/** Narrow by `ok`, then by `kind`. */
export type ReadResult = { [K in UploadKind]: ReadSuccess<K> }[UploadKind] | ReadFailure;
