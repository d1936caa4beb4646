'use client';

import { TextAction } from '@/components/ui/text-action';
import { describeFault, type Fault, type RefusedFile } from '@/lib/errors';
import { addFormulaGuard } from '@/lib/formats/formula-guard';
import { writeCsv } from '@/lib/formats/write-csv';

/** The item that a fault names, such as `target "RB 0001"`. */
function targetOf(fault: Fault): string | null {
  return /^target "(.+)"$/.exec(fault.item ?? '')?.[1] ?? null;
}

/** The line at fault between its neighbours, as the file has them. */
function Lines({ excerpt }: { excerpt: RefusedFile['excerpts'][number] }) {
  const lines = [
    { number: excerpt.line - 1, text: excerpt.before },
    { number: excerpt.line, text: excerpt.text },
    { number: excerpt.line + 1, text: excerpt.after },
  ].filter((line): line is { number: number; text: string } => line.text !== null);
  return (
    <div className="overflow-x-auto border-rule border-b bg-surface py-1 text-[13px]">
      {lines.map(({ number, text }) => {
        const isAtFault = number === excerpt.line;
        return (
          <div
            key={number}
            className={`flex w-max min-w-full gap-4 whitespace-pre px-3.5 tabular-nums ${isAtFault ? 'bg-bad-soft text-ink' : 'text-ink3'}`}
          >
            <span className="w-10 shrink-0 text-right">{number}</span>
            <span>{text === '' ? ' ' : text}</span>
          </div>
        );
      })}
    </div>
  );
}

/** A cell that a spreadsheet would run, such as "=2+5", must not run from our file either. */
const isFormula = (cell: string) => /^[=+\-@\t\r]/.test(cell) && !/^[+-]?[\d.]/.test(cell);
const safe = (cell: string) => (isFormula(cell) ? addFormulaGuard(cell) : cell);

function saveRows({ headings, rows }: NonNullable<RefusedFile['offending']>, fileName: string) {
  const text = writeCsv([
    ...headings.map((heading, index) => ({
      name: safe(heading) || `column ${index + 1}`,
      values: rows.map(({ cells }) => safe(cells[index])),
    })),
    { name: 'fault_place', values: rows.map(({ place }) => place) },
    { name: 'fault_column', values: rows.map(({ column }) => column) },
    { name: 'code', values: rows.map(({ code }) => code) },
    { name: 'found', values: rows.map(({ found }) => found) },
    { name: 'expected', values: rows.map(({ expected }) => expected) },
  ]);
  const address = URL.createObjectURL(new Blob([text], { type: 'text/csv' }));
  const link = document.createElement('a');
  link.href = address;
  link.download = `${fileName.replace(/\.[^.]+$/, '')}-rows-to-mend.csv`;
  link.click();
  URL.revokeObjectURL(address);
}

interface FileFaultsProps {
  fileName: string;
  faults: Fault[];
  count: number;
  refused: RefusedFile | undefined;
  onLeaveOut(target: string): void;
}

/** Every fault with its place and the lines around it; the rows at fault as a file. */
export function FileFaults({ fileName, faults, count, refused, onLeaveOut }: FileFaultsProps) {
  const told = new Set<number>();
  const offending = refused?.offending ?? null;
  return (
    <>
      <ul className="divide-y divide-rule">
        {faults.map((fault) => {
          const { file: _, ...place } = fault;
          const target = targetOf(fault);
          const sentence = describeFault(place);
          const excerpt = refused?.excerpts.find(
            ({ line }) => line === fault.line && !told.has(line),
          );
          if (excerpt) told.add(excerpt.line);
          return (
            <li key={`${fault.code}-${sentence}`}>
              <div className="flex flex-wrap items-baseline justify-between gap-x-4 bg-bad-soft py-1.5 pr-3.5 pl-[44px] text-[14px]">
                <span className="min-w-0 break-words">{sentence}</span>
                {target !== null && (
                  <TextAction onClick={() => onLeaveOut(target)}>Leave {target} out</TextAction>
                )}
              </div>
              {excerpt && <Lines excerpt={excerpt} />}
            </li>
          );
        })}
        {count > faults.length && (
          <li className="py-1.5 pl-[44px] text-[14px] text-ink3">
            {count} in all; the rest is alike or follows from these.
          </li>
        )}
      </ul>
      {offending && (
        <p className="mt-2 text-note">
          <TextAction onClick={() => saveRows(offending, fileName)}>
            Download the rows to mend
          </TextAction>{' '}
          <span className="text-ink3">
            CSV, the cells as written, with what was found and expected
            {offending.count > offending.rows.length &&
              `; the first ${offending.rows.length} of ${offending.count}`}
          </span>
        </p>
      )}
    </>
  );
}
