import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { bytesOf, type WrittenMaps, type WrittenTable } from '@/lib/formats';
import type { ExportList } from '@/lib/schemas/exports';
import { inTransaction } from '@/models';
import { recordAudit } from '../audit';
import { asRefusal, type ExportFile } from '../exports';
import { type ArrayEnding, arrayEndings, arrayFormats, mapsBytes } from './array-formats';
import { type AskedOptions, type ExportOptions, withDefaults } from './registry';
import { SOFTWARE } from './software';
import {
  type LatexColumns,
  type TableEnding,
  tableBytes,
  tableEndings,
  tableFormats,
} from './table-formats';

/** Tables and maps of something that changes, as it stands when they are asked for. */
export interface CollectionFiles {
  /** Beginning of the files' names: "halyard". */
  stem: string;
  audited: { kind: 'survey' | 'sample' | 'collaboration' | 'map'; id: string };
  tables: Readonly<
    Record<string, { what: string; latex: LatexColumns; build(): Promise<WrittenTable> }>
  >;
  maps?: {
    what: string;
    endings: readonly ArrayEnding[];
    open(options: ExportOptions): Promise<WrittenMaps>;
  };
  missing?: ExportList['missing'];
}

/** What a file of something that is not frozen says of itself. */
export const asItStands = (of: string): WrittenTable['provenance'] => [
  ['state', 'working data, not frozen'],
  ['software', SOFTWARE],
  ['of', of],
  ['written', new Date().toISOString()],
];

export function listCollectionFiles({ tables, maps, missing }: CollectionFiles): ExportList {
  const files: ExportList['files'] = Object.entries(tables).flatMap(([stem, { what }]) =>
    tableEndings.map((ending) => ({
      name: `${stem}.${ending}`,
      group: 'tables' as const,
      what,
      format: tableFormats[ending].name,
      audience: tableFormats[ending].audience,
      mediaType: tableFormats[ending].mediaType,
      byteLength: null,
    })),
  );
  for (const ending of maps?.endings ?? []) {
    files.push({
      name: `maps.${ending}`,
      group: 'maps',
      what: maps?.what ?? '',
      format: arrayFormats[ending].name,
      audience: arrayFormats[ending].audience,
      mediaType: arrayFormats[ending].mediaType,
      byteLength: null,
    });
  }
  return { state: 'working data, not frozen', files, missing: missing ?? [] };
}

const isEnding = <E extends string>(endings: readonly E[], ending: string): ending is E =>
  (endings as readonly string[]).includes(ending);

async function makeContent(files: CollectionFiles, file: string, options: ExportOptions) {
  const [stem, ending] = file.split('.');
  const table = Object.hasOwn(files.tables, stem) ? files.tables[stem] : undefined;
  if (table && isEnding<TableEnding>(tableEndings, ending)) {
    const label = `tab:${files.stem}-${stem}`;
    const { style } = options;
    const bytes = tableBytes(await table.build(), ending, { latex: table.latex, label, style });
    return { content: bytesOf(bytes), contentType: tableFormats[ending].mediaType };
  }
  if (files.maps && stem === 'maps' && isEnding(arrayEndings, ending)) {
    if (!files.maps.endings.includes(ending)) throw new NotFound('export');
    const content = await mapsBytes(await files.maps.open(options), ending);
    return { content, contentType: arrayFormats[ending].mediaType };
  }
  throw new NotFound('export');
}

/** One file, noted in the log. */
export async function writeCollectionFile(
  actor: Actor,
  files: CollectionFiles,
  file: string,
  options: AskedOptions,
): Promise<ExportFile> {
  const made = await makeContent(files, file, withDefaults(options)).catch(asRefusal);
  const fileName = `${files.stem}-${file}`;
  await inTransaction((transaction) =>
    recordAudit(actor, 'export', files.audited, `exported ${fileName}`, transaction),
  );
  return { fileName, ...made };
}
