import type { ChangeEvent, ClipboardEvent } from 'react';
import { inputEdge, inputLook } from '@/components/ui/field-frame';
import { Icon } from '@/components/ui/icon';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';

interface GridColumn {
  name: string;
  head: string;
  isNeeded?: boolean;
}
interface CellField {
  name: string;
  value: string;
  error: string | undefined;
  onChange(event: ChangeEvent<HTMLInputElement>): void;
}

interface CellGridProps {
  caption: string;
  /** What a row is: "target", "point". */
  rowName: string;
  rows: number;
  columns: readonly GridColumn[];
  keyOf(row: number, column: string): string;
  field(name: string): CellField;
  onAdd(): void;
  onRemove(row: number): void;
  /** True where the text was spread over cells. */
  onPaste(row: number, column: number, text: string): boolean;
}

/** A small table to type into or to paste a spreadsheet's cells into. */
export function CellGrid(props: CellGridProps) {
  const { caption, rowName, rows, columns, keyOf, field, onAdd, onRemove, onPaste } = props;
  const paste = (event: ClipboardEvent, row: number, column: number) => {
    if (onPaste(row, column, event.clipboardData.getData('text/plain'))) event.preventDefault();
  };
  const faults = Array.from({ length: rows }, (_, row) => row).flatMap((row) =>
    columns.flatMap(({ name, head }) => {
      const { error } = field(keyOf(row, name));
      return error === undefined ? [] : [{ key: keyOf(row, name), row, head, error }];
    }),
  );
  return (
    <div className="min-w-0">
      <div className="relative max-h-[26rem] overflow-auto">
        <Table caption={caption}>
          <TableHead>
            <tr>
              <HeadCell isNumeric>
                <span className="sr-only">row</span>
              </HeadCell>
              {columns.map(({ name, head, isNeeded = true }) => (
                <HeadCell key={name}>
                  {head}
                  {!isNeeded && <span className="block text-chart">if known</span>}
                </HeadCell>
              ))}
              <HeadCell>
                <span className="sr-only">remove</span>
              </HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {Array.from({ length: rows }, (_, row) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: the fields of a row are named by its place
              <Row key={row}>
                <Cell isNumeric className="text-ink3">
                  {row + 1}
                </Cell>
                {columns.map(({ name, head }, column) => {
                  const { error, ...input } = field(keyOf(row, name));
                  return (
                    <Cell key={name} className="px-1">
                      <input
                        {...input}
                        className={`h-9 max-md:h-11 ${name === 'name' ? 'min-w-36' : 'min-w-20'} ${inputLook} ${inputEdge(error)}`}
                        aria-label={`${head}, ${rowName} ${row + 1}`}
                        aria-invalid={error !== undefined || undefined}
                        inputMode={name === 'name' ? 'text' : 'decimal'}
                        autoComplete="off"
                        spellCheck={false}
                        onPaste={(event) => paste(event, row, column)}
                      />
                    </Cell>
                  );
                })}
                <Cell>
                  <button
                    type="button"
                    className="inline-flex size-9 items-center justify-center text-ink3 hover:text-ink max-md:size-11"
                    onClick={() => onRemove(row)}
                  >
                    <Icon name="close" size={15} />
                    <span className="sr-only">
                      Remove {rowName} {row + 1}
                    </span>
                  </button>
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      </div>
      {faults.length > 0 && (
        <ul className="mt-1 text-bad text-note" role="alert">
          {faults.slice(0, 6).map(({ key, row, head, error }) => (
            <li key={key}>
              {rowName} {row + 1}, {head}: {error}
            </li>
          ))}
          {faults.length > 6 && <li>and {faults.length - 6} more</li>}
        </ul>
      )}
      <div className="mt-2 text-note">
        <TextAction icon="add" onClick={onAdd}>
          Add a {rowName}
        </TextAction>
      </div>
    </div>
  );
}
