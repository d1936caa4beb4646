'use client';

import type { ReactNode } from 'react';
import { SelectField } from '../select-field';
import { TextAction } from '../text-action';
import { TextField } from '../text-field';
import type { Facet, TableView } from './column';

interface FilterBarProps<Row> {
  searchLabel?: string;
  facets: readonly Facet<Row>[];
  view: TableView;
  onView(change: Partial<TableView>): void;
  /** How many are shown, said whenever it changes. */
  count: ReactNode;
  onCsv?(): void;
}

/** Words, facets and the count of what they leave, in one line that wraps. */
export function FilterBar<Row>({
  searchLabel,
  facets,
  view,
  onView,
  count,
  onCsv,
}: FilterBarProps<Row>) {
  return (
    <div className="mb-2 flex flex-wrap items-end gap-x-3 gap-y-2">
      {searchLabel !== undefined && (
        <div className="min-w-44 max-md:w-full">
          <TextField
            label={searchLabel}
            isLabelHidden
            placeholder={searchLabel}
            type="search"
            value={view.words}
            maxLength={100}
            onChange={(event) => onView({ words: event.target.value })}
          />
        </div>
      )}
      {facets.map((facet) => (
        <div key={facet.id} className="max-md:min-w-0 max-md:flex-1 max-md:basis-36">
          <SelectField
            label={facet.label}
            isLabelHidden
            value={view.facets[facet.id] ?? ''}
            onChange={(event) =>
              onView({ facets: { ...view.facets, [facet.id]: event.target.value } })
            }
            options={[{ value: '', label: facet.any }, ...facet.options]}
          />
        </div>
      ))}
      <div className="ml-auto flex flex-wrap items-baseline gap-x-4 text-ink3 text-note max-md:w-full max-md:justify-between">
        <span aria-live="polite">{count}</span>
        {onCsv && (
          <TextAction icon="download" onClick={onCsv}>
            as CSV
          </TextAction>
        )}
      </div>
    </div>
  );
}
