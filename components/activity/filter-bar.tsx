'use client';

import { useRouter } from 'next/navigation';
import { withQuery } from '@/components/hooks/api-path';
import type { ActivityFilter } from '@/components/hooks/use-activity';
import { LinkTabs } from '@/components/ui/link-tabs';
import { SelectField } from '@/components/ui/select-field';
import type { ActivityKind } from '@/lib/schemas/activity';
import type { PersonRef } from '@/lib/schemas/common';

const kindWords: Record<ActivityKind, string> = {
  surveys: 'Surveys and files',
  stars: 'Stars and adopted values',
  candidates: 'Candidates and verdicts',
  analyses: 'Populations, analyses and runs',
  notes: 'Notes',
  releases: 'Releases',
  people: 'People and settings',
};
const kinds = Object.keys(kindWords) as ActivityKind[];

/** All or what concerns the reader, then kind and person; the address holds the choice. */
export function FilterBar({
  collaboration,
  filter,
  people,
}: {
  collaboration: string;
  filter: ActivityFilter;
  people: readonly PersonRef[];
}) {
  const router = useRouter();
  const base = `/${collaboration}/activity`;
  const go = (change: ActivityFilter) =>
    router.push(withQuery(base, { ...filter, ...change }), { scroll: false });
  return (
    <>
      <LinkTabs
        label="Whose news"
        tabs={[
          { href: base, label: 'Everything', isCurrent: filter.for === undefined },
          { href: `${base}?for=me`, label: 'For you', isCurrent: filter.for === 'me' },
        ]}
      />
      <div className="flex flex-wrap gap-4">
        <div className="w-[260px] max-md:w-full">
          <SelectField
            label="Kind"
            value={filter.kind ?? ''}
            onChange={({ target }) => go({ kind: kinds.find((kind) => kind === target.value) })}
            options={[
              { value: '', label: 'all kinds' },
              ...kinds.map((value) => ({ value, label: kindWords[value] })),
            ]}
          />
        </div>
        <div className="w-[260px] max-md:w-full">
          <SelectField
            label="Person"
            value={filter.person ?? ''}
            onChange={({ target }) => go({ person: target.value || undefined })}
            options={[
              { value: '', label: 'everybody' },
              ...people.map(({ id, name }) => ({ value: id, label: name })),
            ]}
          />
        </div>
      </div>
    </>
  );
}
