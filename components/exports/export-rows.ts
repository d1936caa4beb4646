import type { ExportList, ListedExport } from '@/lib/schemas/exports';

export interface ExportRow {
  what: string;
  files: ListedExport[];
}

export interface ExportGroup {
  title: string;
  rows: ExportRow[];
  /** What each format is for, once. */
  formats: { format: string; audience: string }[];
}

const titles: Record<ListedExport['group'], string> = {
  tables: 'Tables',
  maps: 'Maps',
  words: 'For a paper',
};

/** Files by group and content: a line a content, its formats beside each other. */
export function groupExports({ files }: Pick<ExportList, 'files'>): ExportGroup[] {
  return (Object.keys(titles) as ListedExport['group'][]).flatMap((group) => {
    const own = files.filter((file) => file.group === group);
    if (own.length === 0) return [];
    const whats = [...new Set(own.map(({ what }) => what))];
    const formats = new Map(own.map(({ format, audience }) => [format, audience]));
    return [
      {
        title: titles[group],
        rows: whats.map((what) => ({ what, files: own.filter((file) => file.what === what) })),
        formats: [...formats].map(([format, audience]) => ({ format, audience })),
      },
    ];
  });
}

const STEP = 1024;
const units = ['bytes', 'KiB', 'MiB', 'GiB'];

/** "1.2 MiB". */
export function sizeWords(byteLength: number): string {
  let size = byteLength;
  let unit = 0;
  while (size >= STEP && unit < units.length - 1) {
    size /= STEP;
    unit += 1;
  }
  return `${unit === 0 || size >= 10 ? Math.round(size) : size.toFixed(1)}\u2009${units[unit]}`;
}
