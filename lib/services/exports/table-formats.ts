import {
  type LatexStyle,
  type WrittenTable,
  writeCsvTable,
  writeEcsvTable,
  writeFitsTable,
  writeJsonTable,
  writeLatex,
  writeMachineReadableTable,
  writeVotable,
} from '@/lib/formats';

export const tableEndings = ['csv', 'ecsv', 'vot', 'fits', 'tex', 'txt', 'json'] as const;
export type TableEnding = (typeof tableEndings)[number];

/** A paper's table: its columns, and what they are headed by. */
export type LatexColumns = Omit<Parameters<typeof writeLatex>[1], 'label'>;

interface TableFormat {
  name: string;
  mediaType: string;
  /** Who needs it. */
  audience: string;
}

export const tableFormats: Record<TableEnding, TableFormat> = {
  csv: { name: 'CSV', mediaType: 'text/csv; charset=utf-8', audience: 'spreadsheets, R, pandas' },
  ecsv: {
    name: 'ECSV',
    mediaType: 'text/plain; charset=utf-8',
    audience: 'Astropy, with units and provenance',
  },
  vot: {
    name: 'VOTable',
    mediaType: 'application/x-votable+xml',
    audience: 'TOPCAT and the virtual observatory',
  },
  fits: { name: 'FITS', mediaType: 'application/fits', audience: 'archives, with checksums' },
  tex: {
    name: 'LaTeX',
    mediaType: 'application/x-tex; charset=utf-8',
    audience: 'a paper: AASTeX deluxetable, or plain with ?style=tabular',
  },
  txt: {
    name: 'Machine-readable',
    mediaType: 'text/plain; charset=us-ascii',
    audience: 'AAS journals, as supplementary data',
  },
  json: { name: 'JSON', mediaType: 'application/json', audience: 'programs' },
};

const encoder = new TextEncoder();

interface WritingOptions {
  latex: LatexColumns;
  label: string;
  style: LatexStyle;
  authors?: string | undefined;
}

/** A table in one of its containers. */
export function tableBytes(
  table: WrittenTable,
  ending: TableEnding,
  { latex, label, style, authors }: WritingOptions,
): Uint8Array {
  switch (ending) {
    case 'csv':
      return encoder.encode(writeCsvTable(table));
    case 'ecsv':
      return encoder.encode(writeEcsvTable(table));
    case 'vot':
      return encoder.encode(writeVotable(table));
    case 'fits':
      return writeFitsTable(table);
    case 'tex':
      return encoder.encode(writeLatex(table, { ...latex, label }, style));
    case 'txt':
      return encoder.encode(writeMachineReadableTable(table, authors));
    case 'json':
      return encoder.encode(writeJsonTable(table));
  }
}
