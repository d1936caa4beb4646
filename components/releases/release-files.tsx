import { Icon } from '@/components/ui/icon';
import { SectionOpener } from '@/components/ui/section-opener';
import type { ReleasePage } from '@/lib/schemas/release-page';
import { fileAddress, formatOf, sizeWords } from './release-words';

type File = ReleasePage['files'][number];

/** Files of one content stand on one line: "Limits  CSV, VOTable". */
function grouped(files: File[]): { description: string; files: File[] }[] {
  const groups = new Map<string, File[]>();
  for (const file of files) {
    groups.set(file.description, [...(groups.get(file.description) ?? []), file]);
  }
  return [...groups].map(([description, own]) => ({ description, files: own }));
}

/** Everything that the release gives out, each with its checksum. */
export function ReleaseFiles({ files, code }: { files: File[]; code: string }) {
  if (files.length === 0) return null;
  return (
    <section className="print:hidden">
      <SectionOpener title="Files" />
      <ul className="text-note">
        {grouped(files).map(({ description, files: own }) => (
          <li
            key={description}
            className="flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1 border-rule border-b py-2"
          >
            <span className={own[0].mediaType === 'application/zip' ? 'font-semibold' : ''}>
              {description}
            </span>
            <span className="flex flex-wrap justify-end gap-x-3 gap-y-1">
              {own.map((file) => (
                <a
                  key={file.name}
                  href={fileAddress(code, file.name)}
                  download
                  className="inline-flex items-center gap-1 whitespace-nowrap"
                  title={`${file.name}, SHA-256 ${file.sha256}`}
                >
                  <Icon name="download" size={13} />
                  <span className="sr-only">{description} as </span>
                  {formatOf(file.name)}
                  <span className="text-ink3">{sizeWords(file.byteLength)}</span>
                </a>
              ))}
            </span>
          </li>
        ))}
      </ul>
      <details className="mt-2 text-chart text-ink3">
        <summary className="cursor-pointer py-1">Checksums, SHA-256</summary>
        <ul className="mt-1 grid gap-1">
          {files.map((file) => (
            <li key={file.name} className="break-all">
              {file.name}
              <br />
              {file.sha256}
            </li>
          ))}
        </ul>
      </details>
    </section>
  );
}
