import type { ReactNode } from 'react';
import { Icon } from '../icon';
import { HeadCell } from '../table';

interface SortHeadProps {
  children: ReactNode;
  name: string;
  isNumeric: boolean;
  className: string;
  direction: false | 'asc' | 'desc';
  /** Left out where the column has no order. */
  onSort?(): void;
}

/** A head that orders the rows when pressed: up, down, and back to the order they came in. */
export function SortHead({
  children,
  name,
  isNumeric,
  className,
  direction,
  onSort,
}: SortHeadProps) {
  const words = direction && (direction === 'asc' ? 'ascending' : 'descending');
  if (!onSort) {
    return (
      <HeadCell isNumeric={isNumeric} className={className}>
        {children}
      </HeadCell>
    );
  }
  return (
    <HeadCell isNumeric={isNumeric} className={className} aria-sort={words || 'none'}>
      <button
        type="button"
        className={`inline-flex items-end gap-1 hover:text-ink max-md:min-h-11 max-md:items-center ${isNumeric ? 'flex-row-reverse' : ''} ${direction ? 'font-semibold text-ink' : ''}`}
        title={`Order by ${name}`}
        onClick={() => onSort()}
      >
        <span className={isNumeric ? 'text-right' : 'text-left'}>{children}</span>
        <span className={`w-3 ${direction ? '' : 'opacity-0'}`}>
          <Icon name="down" size={12} className={direction === 'asc' ? 'rotate-180' : ''} />
        </span>
      </button>
    </HeadCell>
  );
}
