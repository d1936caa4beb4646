import type { ComponentProps, ReactNode, TdHTMLAttributes, ThHTMLAttributes } from 'react';

interface TableProps {
  /** Read before the table; seen only with `isCaptionShown`. */
  caption: ReactNode;
  isCaptionShown?: boolean;
  children: ReactNode;
  className?: string;
}

/**
 * Semantic table without stripes; scrolls sideways inside itself, never the page, and shades the edge
 * at which it is cut off. It is positioned, so that words for screen readers alone, which are absolute, stay inside it too.
 */
export function Table({ caption, isCaptionShown = false, children, className = '' }: TableProps) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
    <div className="scrolls-sideways relative min-w-0 focus-visible:outline-offset-0" tabIndex={0}>
      <table className={`w-full border-collapse text-note ${className}`}>
        <caption className={isCaptionShown ? 'pb-2 text-left text-ink3 text-note' : 'sr-only'}>
          {caption}
        </caption>
        {children}
      </table>
    </div>
  );
}

export function TableHead({ children }: { children: ReactNode }) {
  return <thead>{children}</thead>;
}

export function TableBody({ children }: { children: ReactNode }) {
  return <tbody>{children}</tbody>;
}

interface RowProps extends ComponentProps<'tr'> {
  isSelected?: boolean;
  /** The last line, "every star once": bold under a stronger rule. */
  isTotal?: boolean;
  tone?: 'bad' | 'warn';
}

export function Row({
  isSelected = false,
  isTotal = false,
  tone,
  className = '',
  ...row
}: RowProps) {
  const ground =
    tone === 'bad'
      ? 'bg-bad-soft'
      : tone === 'warn'
        ? 'bg-warn-soft'
        : isSelected
          ? 'bg-act-soft'
          : '';
  return (
    <tr
      {...row}
      aria-selected={isSelected || undefined}
      className={`${isTotal ? 'border-rule2 border-t font-semibold' : 'border-rule border-b'} ${ground} ${className}`}
    />
  );
}

interface HeadCellProps extends ThHTMLAttributes<HTMLTableCellElement> {
  isNumeric?: boolean;
}

export function HeadCell({
  isNumeric = false,
  className = '',
  scope = 'col',
  ...cell
}: HeadCellProps) {
  return (
    <th
      {...cell}
      scope={scope}
      className={`whitespace-nowrap border-rule2 border-b px-2.5 py-[5px] align-bottom font-normal text-ink3 first:pl-0 last:pr-0 ${isNumeric ? 'text-right' : 'text-left'} ${className}`}
    />
  );
}

interface CellProps extends TdHTMLAttributes<HTMLTableCellElement> {
  isNumeric?: boolean;
  /** The name of the row: a row header for readers. */
  isRowHead?: boolean;
}

export function Cell({ isNumeric = false, isRowHead = false, className = '', ...cell }: CellProps) {
  const look = `h-[34px] px-2.5 py-1.5 align-middle first:pl-0 last:pr-0 ${isNumeric ? 'whitespace-nowrap text-right' : 'text-left'} ${className}`;
  return isRowHead ? (
    <th {...cell} scope="row" className={`${look} font-semibold`} />
  ) : (
    <td {...cell} className={look} />
  );
}

/** The error beside its value: 46.6 ± 0.18. */
export function ErrorTerm({ children }: { children: ReactNode }) {
  return (
    <span className="text-ink3">
      {'\u00a0±\u00a0'}
      {children}
    </span>
  );
}
