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
import { describeFault, type Fault } from '@/lib/errors';
import type { UploadReport, UploadSettings } from '@/lib/schemas/uploads';
import { AxisFields } from './axis-fields';
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

/** The item that a fault names, such as `target "RB 0001"`. */
function targetOf(fault: Fault): string | null {
  return /^target "(.+)"$/.exec(fault.item ?? '')?.[1] ?? null;
}

function Faults({
  faults,
  count,
  onLeaveOut,
}: {
  faults: Fault[];
  count: number;
  onLeaveOut(target: string): void;
}) {
  return (
    <ul className="divide-y divide-rule">
      {faults.map((fault) => {
        const { file: _, ...place } = fault;
        const target = targetOf(fault);
        const sentence = describeFault(place);
        return (
          <li
            key={`${fault.code}-${sentence}`}
            className="flex flex-wrap items-baseline justify-between gap-x-4 bg-bad-soft py-1.5 pr-3.5 pl-[44px] text-[14px]"
          >
            <span className="min-w-0 break-words">{sentence}</span>
            {target !== null && (
              <TextAction onClick={() => onLeaveOut(target)}>Leave {target} out</TextAction>
            )}
          </li>
        );
      })}
      {count > faults.length && (
        <li className="py-1.5 pl-[44px] text-[14px] text-ink3">
          {count} in all; the rest is alike or follows from these.
        </li>
      )}
    </ul>
  );
}

function Columns({
  report,
  settings,
  onSettings,
}: {
  report: UploadReport;
  settings: UploadSettings;
  onSettings(next: UploadSettings): void;
}) {
  const ignored = report.columns.filter(
    (column) => column.readAs === null && column.heading !== '',
  );
  return (
    <div className="mb-4 grid grid-cols-2 gap-2 md:grid-cols-4 xl:grid-cols-6">
      {report.columns
        .filter((column) => column.readAs !== null)
        .map((column) => (
          <div key={column.index} className="min-w-0 bg-well px-3 py-2 text-[14px]">
            <div className="truncate font-semibold" title={column.heading}>
              {column.heading}
            </div>
            <div className="text-ink3">
              read as {column.readAs}
              {column.unit ? `, ${column.unit}` : ''}
            </div>
          </div>
        ))}
      {ignored.map((column) => (
        <div
          key={column.index}
          className="min-w-0 border border-rule border-dashed px-3 py-2 text-[14px]"
        >
          <div className="truncate font-semibold" title={column.heading}>
            {column.heading}
          </div>
          <TextField
            label={`Read ${column.heading} as`}
            isLabelHidden
            placeholder="ignored; read as …"
            defaultValue={settings.columnMap?.[column.heading] ?? ''}
            onBlur={(event) => {
              const readAs = event.target.value.trim();
              if (readAs === (settings.columnMap?.[column.heading] ?? '')) return;
              onSettings({
                ...settings,
                columnMap: { ...settings.columnMap, [column.heading]: readAs },
              });
            }}
          />
        </div>
      ))}
    </div>
  );
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
}

/** One file: what each column was read as, every fault with its place, and what would be stored. */
export function FileCheck({ entry, onSettings, onStore, onDrop }: FileCheckProps) {
  const headingId = useId();
  const { upload, problem, settings, kind } = entry;
  const state = states[entry.state];
  const report = upload?.report;
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
        <StateMark kind={state.kind}>{state.words}</StateMark>
        {report && <span className="text-[14px] text-ink3">{report.summary}</span>}
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
        <Faults faults={problem.faults} count={problem.faultCount} onLeaveOut={leaveOut} />
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
      {report && (
        <>
          <Columns report={report} settings={settings} onSettings={onSettings} />
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
