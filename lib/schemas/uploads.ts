import { z } from 'zod';
import { idSchema, lineSchema, moment } from './common';
import { faultSchema, readColumnSchema } from './problem';

export const uploadKindSchema = z.enum([
  'targets',
  'contrast-curves',
  'completeness-maps',
  'companions',
  'cooling-tables',
  'systems',
]);
export type UploadKindName = z.infer<typeof uploadKindSchema>;

/** The query of POST …/uploads; the body is the file itself, its SHA-256 may come in a header. */
export const uploadQuerySchema = z.strictObject({
  kind: uploadKindSchema,
  /** Needed for every kind but cooling tables and systems. */
  survey: z.string().optional(),
  name: lineSchema(200),
  /** Settings for the first reading, as JSON. */
  settings: z.string().max(100_000).optional(),
  /** A file that came in parts, whole by now: the body stays empty then. */
  unfinished: idSchema.optional(),
});
export type UploadQuery = z.infer<typeof uploadQuerySchema>;

/** The query of POST …/unfinished-files, with what the header Upload-Length says. */
export const unfinishedQuerySchema = uploadQuerySchema.pick({ kind: true, survey: true });
export type UnfinishedFileRequest = z.infer<typeof unfinishedQuerySchema> & { byteLength: number };

/** A file that is sent part by part, by the core of the tus protocol 1.0 with creation. */
export const unfinishedFileSchema = z.object({
  id: idSchema,
  byteLength: z.number(),
  /** Bytes that have come: the offset at which the next part begins. */
  received: z.number(),
});
export type UnfinishedFileView = z.infer<typeof unfinishedFileSchema>;

/** What a person may decide between reading and storing; each change reads the file again. */
export const uploadSettingsSchema = z.strictObject({
  /** For curve files and wide maps without a target column. */
  defaultTarget: lineSchema(100).optional(),
  notMeasuredIsZero: z.boolean().optional(),
  /** The axes of a .npy file, which has none: a list, linspace(a,b,n) or geomspace(a,b,n). */
  axes: z
    .strictObject({
      mass: z.string().max(10_000).optional(),
      semiMajorAxis: z.string().max(10_000).optional(),
    })
    .optional(),
  /** Heading in the file → our column, or '' to leave it out. */
  columnMap: z.record(z.string(), z.string()).optional(),
  /** Name of a cooling table, or of the population that systems become. */
  title: lineSchema(100).optional(),
  /** Systems: number of the population of which they are a new version. */
  versionOf: z.number().int().positive().optional(),
  /** Items of the file that are left out: a target's name. */
  leaveOut: z.array(z.string().max(300)).optional(),
});
export type UploadSettings = z.infer<typeof uploadSettingsSchema>;

export const noteSchema = z.object({
  code: z.string(),
  level: z.enum(['information', 'warning']),
  line: z.number().optional(),
  column: z.string().optional(),
  item: z.string().optional(),
  message: z.string(),
});

export const previewSchema = z.object({
  /** The first rows in our columns and units; null where the file is no table. */
  table: z
    .object({
      columns: z.array(z.object({ name: z.string(), unit: z.string().nullable() })),
      rows: z.array(z.array(z.union([z.string(), z.number(), z.null()]))),
    })
    .nullable(),
  curves: z.array(
    z.object({
      target: z.string(),
      band: z.string(),
      epoch: z.string().nullable(),
      nSigma: z.number(),
      separationArcsec: z.array(z.number()),
      contrastMag: z.array(z.number()),
    }),
  ),
  /** Thinned to 40 × 40 nodes; values in the order [mass, semi-major axis]. */
  maps: z.array(
    z.object({
      target: z.string(),
      massMjup: z.array(z.number()),
      semiMajorAxisAu: z.array(z.number()),
      completeness: z.array(z.number()),
    }),
  ),
});
export type UploadPreview = z.infer<typeof previewSchema>;

/** What the dry run says: the same code that stores has read every line. */
export const uploadReportSchema = z.object({
  container: z.string(),
  /** Which part of the container was read, such as `HDU 2`. */
  part: z.string().nullable().optional(),
  /** The beginning of the file as read; not kept once the file is stored, and left out of lists. */
  preview: previewSchema.optional(),
  /** A mapping of columns that came from an earlier file with these headings. */
  remembered: z.object({ id: z.string() }).nullable().optional(),
  rows: z.number(),
  columns: z.array(readColumnSchema),
  notes: z.array(noteSchema),
  faults: z.array(faultSchema),
  faultCount: z.number(),
  /** One line an item: what would be stored, and whether it is new, known or replaced. */
  items: z.array(
    z.object({
      name: z.string(),
      outcome: z.enum(['new', 'known-star', 'replaces', 'unchanged', 'left-out']),
      summary: z.string(),
    }),
  ),
  /** Counts in words: "94 new targets, 2 of known stars". */
  summary: z.string(),
});
export type UploadReport = z.infer<typeof uploadReportSchema>;

export const uploadSchema = z.object({
  id: idSchema,
  kind: uploadKindSchema,
  survey: z.string().nullable(),
  fileName: z.string(),
  byteLength: z.number(),
  sha256: z.string(),
  state: z.enum(['read', 'stored', 'withdrawn']),
  settings: uploadSettingsSchema,
  report: uploadReportSchema,
  uploadedBy: z.string().nullable(),
  createdAt: moment,
  storedAt: moment.nullable(),
  /** The how-manieth file of its kind that the survey stored. */
  version: z.number().int().positive().nullable(),
  withdrawnBy: z.string().nullable(),
  withdrawnAt: moment.nullable(),
});
export type UploadView = z.infer<typeof uploadSchema>;

/** How columns of files with certain headings were mapped when one of them was stored. */
export const columnMappingSchema = z.object({
  id: idSchema,
  kind: uploadKindSchema,
  headings: z.array(z.string()),
  columnMap: z.record(z.string(), z.string()),
  keptBy: z.string().nullable(),
  keptAt: moment,
});
export type ColumnMapping = z.infer<typeof columnMappingSchema>;

const someNames = z.object({ count: z.number(), names: z.array(z.string()) });

/** What a stored file carries, and what withdrawing it would do. */
export const dependentsSchema = z.object({
  /** Targets that would be left out: no other file had listed them before. */
  targetsLeftOut: someNames,
  /** Targets, curves, maps and companions that go back to what stood before this file. */
  goBack: someNames,
  /** Curves, maps and companions that end, with nothing before them. */
  end: someNames,
  /** What a later file or a person has decided since, and what stays as it is. */
  stay: someNames,
  /** Finished runs that read the survey after this file was stored and count one of its stars. */
  runs: z.array(
    z.object({
      analysis: z.number(),
      name: z.string(),
      run: z.number(),
      finishedAt: moment,
    }),
  ),
});
export type UploadDependents = z.infer<typeof dependentsSchema>;
