'use client';

import { TextAction } from '@/components/ui/text-action';
import { TextField } from '@/components/ui/text-field';
import type { UploadReport, UploadSettings } from '@/lib/schemas/uploads';

interface FileColumnsProps {
  columns: UploadReport['columns'];
  settings: UploadSettings;
  /** The mapping of an earlier file with these headings was applied. */
  isRemembered: boolean;
  canChange: boolean;
  onSettings(next: UploadSettings): void;
  onForget(): void;
}

/** What each heading was read as; a heading can be mapped to one of our columns, or left out. */
export function FileColumns(props: FileColumnsProps) {
  const { columns, settings, isRemembered, canChange, onSettings, onForget } = props;
  const map = settings.columnMap ?? {};
  const setMap = (heading: string, readAs: string | undefined) => {
    const { [heading]: _, ...others } = map;
    const columnMap = readAs === undefined ? others : { ...others, [heading]: readAs };
    onSettings({ ...settings, columnMap });
  };
  const named = columns.filter(({ heading }) => heading !== '');
  const read = named.filter(({ readAs }) => readAs !== null);
  const ignored = named.filter(({ readAs }) => readAs === null);
  return (
    <>
      {isRemembered && (
        <p className="mb-2 text-note">
          Columns are mapped as last time for these headings.{' '}
          {canChange && <TextAction onClick={onForget}>Forget that mapping</TextAction>}
        </p>
      )}
      <div className="mb-4 grid grid-cols-2 gap-2 md:grid-cols-4 xl:grid-cols-6">
        {read.map(({ index, heading, readAs, unit }) => (
          <div key={index} className="min-w-0 bg-well px-3 py-2 text-[14px]">
            <div className="truncate font-semibold" title={heading}>
              {heading}
            </div>
            <div className="break-words text-ink3">
              read as {readAs}
              {unit ? `, ${unit}` : ''}
            </div>
            {canChange && (
              <TextAction onClick={() => setMap(heading, '')}>
                Leave out<span className="sr-only"> {heading}</span>
              </TextAction>
            )}
          </div>
        ))}
        {ignored.map(({ index, heading }) => (
          <div
            key={index}
            className="min-w-0 border border-rule border-dashed px-3 py-2 text-[14px]"
          >
            <div className="truncate font-semibold" title={heading}>
              {heading}
            </div>
            {map[heading] === '' ? (
              <>
                <div className="text-ink3">left out</div>
                {canChange && (
                  <TextAction onClick={() => setMap(heading, undefined)}>
                    Take back<span className="sr-only"> {heading}</span>
                  </TextAction>
                )}
              </>
            ) : (
              <TextField
                label={`Read ${heading} as`}
                isLabelHidden
                placeholder="ignored; read as …"
                defaultValue={map[heading] ?? ''}
                disabled={!canChange}
                onBlur={(event) => {
                  const readAs = event.target.value.trim();
                  if (readAs !== (map[heading] ?? '')) setMap(heading, readAs || undefined);
                }}
              />
            )}
          </div>
        ))}
      </div>
    </>
  );
}
