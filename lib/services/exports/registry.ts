import { bytesOf, type FloatFormat, type LatexStyle, type WrittenBytes } from '@/lib/formats';
import { type FinishedRun, writeIntervalsTable, writeLimitsTable } from '../export-limits';
import { type ArrayEnding, arrayEndings, arrayFormats, mapsBytes } from './array-formats';
import { writeMethods, writeReferences } from './methods';
import { combinedMapOfRun, mapsOfRun, posteriorArray } from './run-arrays';
import { runTables, tableOfRun } from './run-tables';
import { type TableEnding, tableBytes, tableEndings, tableFormats } from './table-formats';

export interface ExportOptions {
  /** Of LaTeX tables. */
  style: LatexStyle;
  /** Of maps. */
  precision: FloatFormat;
}

export const defaultOptions: ExportOptions = { style: 'deluxetable', precision: 'float32' };

export type AskedOptions = { [Name in keyof ExportOptions]?: ExportOptions[Name] | undefined };

export const withDefaults = ({ style, precision }: AskedOptions): ExportOptions => ({
  style: style ?? defaultOptions.style,
  precision: precision ?? defaultOptions.precision,
});

/** One file that a finished run offers. */
export interface RunExport {
  /** Last part of its address: "limits.ecsv". */
  name: string;
  group: 'tables' | 'maps' | 'words';
  /** Its content, for people; files of one content differ in format alone. */
  what: string;
  format: string;
  /** Who needs it in that format. */
  audience: string;
  mediaType: string;
  /** Makes it: a large one part by part as it is sent. @throws RangeError for what cannot be written */
  make(run: FinishedRun, options: ExportOptions): Promise<WrittenBytes>;
}

const encoder = new TextEncoder();

function tableExport(stem: string, ending: TableEnding): RunExport {
  const { what, latex } = runTables[stem];
  const { name: format, mediaType, audience } = tableFormats[ending];
  return {
    name: `${stem}.${ending}`,
    group: 'tables',
    what,
    format,
    audience,
    mediaType,
    make: async (run, { style }) => {
      // In a paper limits are read level by level; the intervals are a table of their own.
      if (ending === 'tex' && (stem === 'limits' || stem === 'levels')) {
        const tables = [writeLimitsTable(run, style)];
        if (stem === 'limits') tables.push(writeIntervalsTable(run, style));
        return bytesOf(encoder.encode(tables.join('\n')));
      }
      const table = await tableOfRun(run, stem);
      const label = `tab:${run.analysis.toLowerCase()}-run-${run.number}-${stem}`;
      const authors = run.release?.authors.map(({ name }) => name).join(', ');
      return bytesOf(tableBytes(table, ending, { latex, label, style, authors }));
    },
  };
}

const mapSources = {
  maps: {
    what: 'Completeness map of every star',
    open: mapsOfRun,
    endings: arrayEndings.filter((ending) => ending !== 'json'),
  },
  combined_map: {
    what: 'Mean map over the stars',
    open: combinedMapOfRun,
    endings: arrayEndings,
  },
} as const;

function mapExport(stem: keyof typeof mapSources, ending: ArrayEnding): RunExport {
  const { what, open } = mapSources[stem];
  const { name: format, mediaType, audience } = arrayFormats[ending];
  return {
    name: `${stem}.${ending}`,
    group: 'maps',
    what,
    format,
    audience,
    mediaType,
    make: (run, { precision }) => mapsBytes(open(run, precision), ending),
  };
}

function wordsExport(
  name: string,
  what: string,
  [format, mediaType, audience]: [string, string, string],
  write: (run: FinishedRun) => string,
): RunExport {
  return {
    name,
    group: 'words',
    what,
    format,
    audience,
    mediaType,
    make: async (run) => bytesOf(encoder.encode(write(run))),
  };
}

const METHODS = 'Methods paragraph';

/** Every file of a run that is not a drawing, in the order in which it is offered. */
export const runExports: readonly RunExport[] = [
  ...Object.keys(runTables).flatMap((stem) =>
    tableEndings.map((ending) => tableExport(stem, ending)),
  ),
  {
    name: 'posterior.npy',
    group: 'tables',
    what: runTables.posterior.what,
    format: 'NPY',
    audience: 'NumPy: doubles [point, 3] of value, density, cumulative',
    mediaType: arrayFormats.npy.mediaType,
    make: async (run) => bytesOf(posteriorArray(run)),
  },
  ...(Object.keys(mapSources) as (keyof typeof mapSources)[]).flatMap((stem) =>
    mapSources[stem].endings.map((ending) => mapExport(stem, ending)),
  ),
  wordsExport(
    'methods.txt',
    METHODS,
    ['Text', 'text/plain; charset=utf-8', 'a draft or a mail'],
    (run) => writeMethods(run, 'txt'),
  ),
  wordsExport(
    'methods.md',
    METHODS,
    ['Markdown', 'text/markdown; charset=utf-8', 'notebooks, with Pandoc’s citation keys'],
    (run) => writeMethods(run, 'md'),
  ),
  wordsExport(
    'methods.tex',
    METHODS,
    ['LaTeX', 'application/x-tex; charset=utf-8', 'a paper, with natbib'],
    (run) => writeMethods(run, 'tex'),
  ),
  wordsExport(
    'references.bib',
    'References that the paragraph cites',
    ['BibTeX', 'application/x-bibtex; charset=utf-8', 'a paper'],
    writeReferences,
  ),
];

export function findRunExport(name: string): RunExport | undefined {
  return runExports.find((one) => one.name === name);
}
