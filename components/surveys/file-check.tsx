'use client';

import { useId } from 'react';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { type StateKind, StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { TextField } from '@/components/ui/text-field';
import type { UploadReport, UploadSettings } from '@/lib/schemas/uploads';
import { AxisFields } from './axis-fields';
import { FileColumns } from './file-columns';
import { FileFaults } from './file-faults';
import { FilePreview } from './file-preview';
import type { IncomingEntry } from './incoming-entry';

const SHOWN = 12;

const states: Record<IncomingEntry['state'], { kind: StateKind; words: string }> = {
  reading: { kind: 'running', words: 'reading every line' },
  read: { kind: 'ok', words: 'ready to store' },
  refused: { kind: 'bad', words: 'refused, nothing is stored' },
  storing: { kind: 'running', words: 'storing' },
  stored: { kind: 'ok', words: 'stored' },
};

const outcomeWords: Record<
  UploadReport['items'][number]['outcome'],
  { kind: StateKind; words: string }
> = {
  new: { kind: 'ok', words: 'new' },
  'known-star': { kind: 'ok', words: 'a star that is known' },
  replaces: { kind: 'warn', words: 'replaces what is there' },
  unchanged: { kind: 'stopped', words: 'unchanged' },
  'left-out': { kind: 'stopped', words: 'left out' },
};

const containerNames: Record<string, string> = {
  csv: 'CSV',
  ecsv: 'ECSV',
  votable: 'VOTable',
  fits: 'FITS',
  npy: 'NumPy array',
  npz: 'NPZ archive',
  hdf5: 'HDF5',
  json: 'JSON',
};

/** "read as FITS, HDU 2": the first bytes decide, not the name. */
function describeContainer({ container, part }: UploadReport): string {
  const name = containerNames[container] ?? container;
  return `read as ${name}${part ? `, ${part}` : ''}`;
}

function Items({ report }: { report: UploadReport }) {
  const shown = report.items.slice(0, SHOWN);
  return (
    <>
      <Table caption="What would be stored">
        <TableHead>
          <Row>
            <HeadCell>item</HeadCell>
            <HeadCell>what it says</HeadCell>
            <HeadCell>match</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {shown.map((item) => (
            <Row key={`${item.name}-${item.summary}`}>
              <Cell isRowHead className="whitespace-nowrap">
                {item.name}
              </Cell>
              <Cell>{item.summary}</Cell>
              <Cell>
                <StateMark kind={outcomeWords[item.outcome].kind}>
                  {outcomeWords[item.outcome].words}
                </StateMark>
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      {report.items.length > SHOWN && (
        <p className="mt-1 text-[14px] text-ink3">and {report.items.length - SHOWN} more</p>
      )}
    </>
  );
}

/** A fault may name its line alone; the person knows whose line it is. */
function LeaveOutField({
  settings,
  onSettings,
}: Pick<FileCheckProps, 'onSettings'> & {
  settings: UploadSettings;
}) {
  return (
    <form
      className="flex items-end gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        const target = String(new FormData(event.currentTarget).get('target')).trim();
        if (target === '') return;
        event.currentTarget.reset();
        onSettings({ ...settings, leaveOut: [...(settings.leaveOut ?? []), target] });
      }}
    >
      <TextField label="Leave a target out" name="target" placeholder="its name" maxLength={100} />
      <Button type="submit">Leave out</Button>
    </form>
  );
}

interface FileCheckProps {
  entry: IncomingEntry;
  onSettings(settings: UploadSettings): void;
  onStore(): void;
  onDrop(): void;
  /** Forgets a remembered mapping of columns and reads the file again. */
  onForget?(id: string): void;
}

/** One file: what each column was read as, every fault with its place, and what would be stored. */
export function FileCheck({ entry, onSettings, onStore, onDrop, onForget }: FileCheckProps) {
  const headingId = useId();
  const { upload, problem, settings, kind, sent = 0 } = entry;
  const isOnItsWay = entry.state === 'reading' && upload === null && sent < 1;
  const state = states[entry.state];
  const report = upload?.report;
  const columns = report?.columns ?? problem?.refused?.columns ?? [];
  // Where the person has mapped nothing, what was remembered holds.
  const columnMap =
    settings.columnMap ?? upload?.settings.columnMap ?? problem?.refused?.remembered?.columnMap;
  const mapped = { ...settings, columnMap };
  const remembered = report?.remembered ?? problem?.refused?.remembered ?? null;
  const canAct = entry.state === 'read' || entry.state === 'refused';
  const leaveOut = (target: string) =>
    onSettings({ ...settings, leaveOut: [...(settings.leaveOut ?? []), target] });
  const needsTarget = kind === 'contrast-curves' || kind === 'completeness-maps';
  return (
    <article aria-labelledby={headingId}>
      <div className="mb-3 flex flex-wrap items-baseline gap-x-4 gap-y-1">
        <h3 id={headingId} className="font-semibold text-[16px] break-all">
          {entry.file.name}
        </h3>
        <StateMark kind={state.kind}>
          {isOnItsWay ? `sending, ${Math.floor(100 * sent)}\u202f%` : state.words}
        </StateMark>
        {isOnItsWay && (
          <progress
            className="h-1.5 w-40 accent-act"
            value={sent}
            aria-label={`Sending ${entry.file.name}`}
          />
        )}
        {report && (
          <span className="text-[14px] text-ink3">
            {report.summary}; {describeContainer(report)}
          </span>
        )}
        <span className="ml-auto flex gap-4">
          {entry.state === 'read' && <TextAction onClick={onStore}>Store this file</TextAction>}
          {canAct && <TextAction onClick={onDrop}>Drop this file</TextAction>}
        </span>
      </div>
      {entry.failure !== null && <Notice tone="bad" title={entry.failure} isAnnounced />}
      {problem && (
        <Notice
          tone="bad"
          isAnnounced
          title={
            problem.faults.length === 0
              ? problem.message
              : `${problem.faultCount} ${problem.faultCount === 1 ? 'place' : 'places'} to mend. Nothing is stored.`
          }
          actions={
            <Button size="small" onClick={() => onSettings(settings)}>
              Read the file again
            </Button>
          }
        />
      )}
      {problem && problem.faults.length > 0 && (
        <FileFaults
          fileName={entry.file.name}
          faults={problem.faults}
          count={problem.faultCount}
          refused={problem.refused}
          onLeaveOut={leaveOut}
        />
      )}
      {canAct && (
        <div className="my-3 flex flex-wrap items-end gap-4">
          {kind !== 'cooling-tables' && entry.state === 'refused' && (
            <LeaveOutField settings={settings} onSettings={onSettings} />
          )}
          {needsTarget && (
            <TextField
              label="The star of a file without a target column"
              defaultValue={settings.defaultTarget ?? ''}
              onBlur={(event) => {
                const defaultTarget = event.target.value.trim() || undefined;
                if (defaultTarget !== settings.defaultTarget)
                  onSettings({ ...settings, defaultTarget });
              }}
            />
          )}
          {kind === 'completeness-maps' && /\.npy(\.gz)?$/i.test(entry.file.name) && (
            <AxisFields settings={settings} onSettings={onSettings} />
          )}
          {kind === 'completeness-maps' && (
            <CheckboxField
              label="Not measured means 0"
              checked={settings.notMeasuredIsZero ?? false}
              onChange={(event) =>
                onSettings({ ...settings, notMeasuredIsZero: event.target.checked })
              }
            />
          )}
          {kind === 'cooling-tables' && (
            <TextField
              label="Name of the cooling table"
              defaultValue={settings.title ?? entry.file.name.replace(/\.[^.]+$/, '')}
              onBlur={(event) => {
                const title = event.target.value.trim() || undefined;
                if (title !== settings.title) onSettings({ ...settings, title });
              }}
            />
          )}
          {(settings.leaveOut?.length ?? 0) > 0 && (
            <SelectField
              label="Left out; choose one to take it back in"
              value=""
              onChange={(event) =>
                onSettings({
                  ...settings,
                  leaveOut: settings.leaveOut?.filter((name) => name !== event.target.value),
                })
              }
              options={[
                { value: '', label: `${settings.leaveOut?.length} left out` },
                ...(settings.leaveOut ?? []).map((name) => ({ value: name, label: name })),
              ]}
            />
          )}
        </div>
      )}
      {columns.length > 0 && (
        <FileColumns
          columns={columns}
          settings={mapped}
          isRemembered={remembered !== null}
          canChange={canAct}
          onSettings={onSettings}
          onForget={() => onForget?.(remembered?.id ?? '')}
        />
      )}
      {report && (
        <>
          {report.preview && <FilePreview preview={report.preview} rows={report.rows} />}
          {report.notes.length > 0 && (
            <ul className="mb-4 text-[14px]">
              {report.notes.map((note) => (
                <li
                  key={`${note.code}-${note.line}-${note.message}`}
                  className="flex gap-2 border-rule border-b py-1"
                >
                  <StateMark kind={note.level === 'warning' ? 'warn' : 'waiting'}>
                    <span className="whitespace-nowrap">
                      {note.line === undefined ? (note.item ?? 'file') : `line ${note.line}`}
                    </span>
                  </StateMark>
                  <span className="min-w-0 break-words">{note.message}</span>
                </li>
              ))}
            </ul>
          )}
          <Items report={report} />
        </>
      )}
    </article>
  );
}
