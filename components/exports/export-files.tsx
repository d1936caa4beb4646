'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { type ExportSource, fileAddress, useExports } from '@/components/hooks/use-exports';
import { Notice } from '@/components/ui/notice';
import { type ExportGroup, groupExports, sizeWords } from './export-rows';

interface ExportFilesProps {
  collaboration: string;
  source: ExportSource;
  /** Drawings, which no list of the server names. */
  drawings?: { name: string; label: string }[];
}

const linkLook = 'inline-flex min-h-6 items-center font-semibold text-act max-md:min-h-11';

/** Every file that something offers: what it holds, in which formats, and whom each format serves. */
export function ExportFiles({ collaboration, source, drawings = [] }: ExportFilesProps) {
  const { data, error } = useExports(collaboration, source, true);
  if (error) {
    return (
      <Notice tone="bad" title="The list of files did not come." isAnnounced>
        {sentenceOf(error)}
      </Notice>
    );
  }
  if (!data) return <p className="py-6 text-ink3 text-note">Looking what there is</p>;
  const address = (file: string) => fileAddress(collaboration, source, file);
  return (
    <>
      <p className="text-ink2 text-note">
        Each file says that it is {data.state}, what it rests on, and which software and inputs made
        it; plain CSV and NPY hold their columns alone.
      </p>
      {groupExports(data).map((group) => (
        <Group key={group.title} group={group} address={address} />
      ))}
      {drawings.length > 0 && (
        <section className="mt-5">
          <h3 className="text-note">Figures</h3>
          <ul className="mt-1 flex flex-wrap gap-x-4 border-rule border-t py-2 text-note">
            {drawings.map(({ name, label }) => (
              <li key={name}>
                <a href={address(name)} download className={linkLook}>
                  {label}
                </a>
              </li>
            ))}
          </ul>
        </section>
      )}
      {data.missing.map(({ name, reason }) => (
        <p key={name} className="mt-4 text-ink3 text-note">
          No {name}: {reason}
        </p>
      ))}
    </>
  );
}

function Group({ group, address }: { group: ExportGroup; address(file: string): string }) {
  return (
    <section className="mt-5">
      <h3 className="text-note">{group.title}</h3>
      <ul className="mt-1">
        {group.rows.map(({ what, files }) => (
          <li
            key={what}
            className="grid gap-x-6 gap-y-0.5 border-rule border-t py-1.5 text-note md:grid-cols-[minmax(0,1fr)_minmax(0,330px)]"
          >
            <span>{what}</span>
            <span className="flex flex-wrap gap-x-3.5">
              {files.map((file) => (
                <a
                  key={file.name}
                  href={address(file.name)}
                  download
                  className={linkLook}
                  title={
                    file.byteLength === null
                      ? file.audience
                      : `${file.audience}; ${sizeWords(file.byteLength)}`
                  }
                >
                  {file.format}
                  <span className="sr-only">, {what}</span>
                </a>
              ))}
            </span>
          </li>
        ))}
      </ul>
      <details className="border-rule border-t pt-1.5 text-note">
        <summary className="w-max text-ink3 max-md:py-3">Which format is for whom</summary>
        <dl className="mt-1 grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-0.5">
          {group.formats.map(({ format, audience }) => (
            <div key={format} className="contents">
              <dt className="text-ink3">{format}</dt>
              <dd>{audience}</dd>
            </div>
          ))}
        </dl>
      </details>
    </section>
  );
}
