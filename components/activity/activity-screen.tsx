'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { type ActivityFilter, fetchEarlier } from '@/components/hooks/use-activity';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import type { ActivityPage } from '@/lib/schemas/activity';
import type { PersonRef } from '@/lib/schemas/common';
import { ActivityDays } from './activity-days';
import { FilterBar } from './filter-bar';

interface ActivityScreenProps {
  collaboration: string;
  initial: ActivityPage;
  filter: ActivityFilter;
  people: readonly PersonRef[];
}

const emptyWords = (filter: ActivityFilter) =>
  filter.for === 'me'
    ? 'Nobody has named you, answered you or asked something of you yet.'
    : Object.values(filter).some((value) => value !== undefined)
      ? 'Nothing of this kind has happened.'
      : 'Nothing has happened yet.';

/** What happened in the collaboration, in plain words, day by day. */
export function ActivityScreen({ collaboration, initial, filter, people }: ActivityScreenProps) {
  const [pages, setPages] = useState([initial]);
  const { perform, isBusy, problem } = useAction();
  const entries = pages.flatMap((page) => page.entries);
  const next = pages[pages.length - 1].next;
  const earlier = async () => {
    if (next === null) return;
    await perform(async () =>
      setPages([...pages, await fetchEarlier(collaboration, filter, next)]),
    );
  };
  const itemLabel = entries.find(({ item }) => item?.id === filter.item)?.item?.label;
  return (
    <>
      <PageTitle title="Activity" context="What happened here, newest first" />
      <FilterBar collaboration={collaboration} filter={filter} people={people} />
      {filter.item !== undefined && (
        <p className="mt-3 text-note">
          Only what concerns <b>{itemLabel ?? 'one thing'}</b>.{' '}
          <Link href={`/${collaboration}/activity`}>Show everything</Link>
        </p>
      )}
      {entries.length === 0 ? (
        <p className="py-6 text-ink3">{emptyWords(filter)}</p>
      ) : (
        <ActivityDays collaboration={collaboration} entries={entries} />
      )}
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      {next !== null && (
        <div className="mt-5">
          <Button isBusy={isBusy} onClick={() => void earlier()}>
            Show earlier entries
          </Button>
        </div>
      )}
    </>
  );
}
