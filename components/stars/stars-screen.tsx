'use client';

import { useState } from 'react';
import { useStars } from '@/components/hooks/use-stars';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import type { StarList } from '@/lib/schemas/stars';
import { StarTable } from './star-table';
import { StarTabs } from './star-tabs';

interface StarsScreenProps {
  collaboration: string;
  initial: StarList;
  surveys: { slug: string; name: string }[];
}

const PAGE = 100;
const only = [
  { value: '', label: 'all stars' },
  { value: 'shared', label: 'in several surveys' },
  { value: 'undecided', label: 'with a pair to decide' },
  { value: 'age-conflict', label: 'ages differ over 2 σ' },
  { value: 'distance-conflict', label: 'distances differ over 2 σ' },
  { value: 'adopted', label: 'with an adopted value' },
];

/** Every star of the collaboration once: search, filters and their count. */
export function StarsScreen({ collaboration, initial, surveys }: StarsScreenProps) {
  const [filter, setFilter] = useState({ q: '', survey: '', only: '', offset: 0 });
  const change = (part: Partial<typeof filter>) => setFilter({ ...filter, offset: 0, ...part });
  const { data: list = initial } = useStars(
    collaboration,
    {
      q: filter.q.trim() || undefined,
      survey: filter.survey || undefined,
      only: filter.only || undefined,
      offset: filter.offset,
      limit: PAGE,
    },
    initial,
  );
  const { counts, total } = list;
  if (counts.stars === 0) {
    return (
      <EmptyState title="No star yet">
        Stars come with the tables of targets that surveys bring; the same star in two surveys is
        found by its Gaia number, by any of its names, or by its place.
      </EmptyState>
    );
  }
  const last = Math.min(filter.offset + PAGE, total);
  return (
    <>
      <StarTabs
        collaboration={collaboration}
        current="stars"
        stars={counts.stars}
        undecided={counts.undecided}
      />
      <div className="mb-3 grid items-end gap-3 md:grid-cols-[minmax(0,1fr)_200px_240px]">
        <TextField
          label="Find by name or Gaia number"
          type="search"
          value={filter.q}
          maxLength={100}
          onChange={(event) => change({ q: event.target.value })}
        />
        <SelectField
          label="Survey"
          value={filter.survey}
          onChange={(event) => change({ survey: event.target.value })}
          options={[
            { value: '', label: 'any survey' },
            ...surveys.map(({ slug, name }) => ({ value: slug, label: name })),
          ]}
        />
        <SelectField
          label="Show"
          value={filter.only}
          onChange={(event) => change({ only: event.target.value })}
          options={only}
        />
      </div>
      <p className="mb-1 text-ink2 text-note" aria-live="polite">
        {total === counts.stars ? `${total} stars` : `${total} of ${counts.stars} stars`}
        {total > PAGE && `, ${filter.offset + 1} to ${last} shown`}
      </p>
      {total > 0 ? (
        <StarTable collaboration={collaboration} stars={list.stars} />
      ) : (
        <p className="py-4 text-ink3">No star fits these filters.</p>
      )}
      {total > PAGE && (
        <div className="mt-3 flex gap-2">
          <Button
            disabledReason={filter.offset === 0 ? 'These are the first' : undefined}
            onClick={() => setFilter({ ...filter, offset: Math.max(0, filter.offset - PAGE) })}
          >
            Earlier
          </Button>
          <Button
            disabledReason={last >= total ? 'These are the last' : undefined}
            onClick={() => setFilter({ ...filter, offset: filter.offset + PAGE })}
          >
            Later
          </Button>
        </div>
      )}
    </>
  );
}
