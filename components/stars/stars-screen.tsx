'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { useAllStars } from '@/components/hooks/use-stars';
import { useUnpacked } from '@/components/hooks/use-unpacked';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { TextAction } from '@/components/ui/text-action';
import type { Packed } from '@/lib/schemas/packed';
import type { StarList } from '@/lib/schemas/stars';
import { StarTable } from './star-table';
import { StarTabs } from './star-tabs';

interface StarsScreenProps {
  collaboration: string;
  /** The first of them; the others follow. */
  initial: Packed<StarList>;
  surveys: { slug: string; name: string }[];
}

/** Every star of the collaboration once: search, filters and their count. */
export function StarsScreen({ collaboration, initial: packed, surveys }: StarsScreenProps) {
  const initial = useUnpacked(packed);
  const { data: list = initial, error, mutate } = useAllStars(collaboration, initial);
  const { counts, total, stars } = list;
  if (counts.stars === 0) {
    return (
      <EmptyState title="No star yet">
        Stars come with the tables of targets that surveys bring; the same star in two surveys is
        found by its Gaia number, by any of its names, or by its place.
      </EmptyState>
    );
  }
  const isPart = stars.length < total;
  return (
    <>
      <StarTabs
        collaboration={collaboration}
        current="stars"
        stars={counts.stars}
        undecided={counts.undecided}
      />
      {isPart && error !== undefined && (
        <Notice
          tone="bad"
          title={`Only ${stars.length} of ${total} stars are here.`}
          actions={<TextAction onClick={() => void mutate()}>Ask for the rest</TextAction>}
          isAnnounced
        >
          {sentenceOf(error)}
        </Notice>
      )}
      {initial.stars.length < total && (
        // Its line stays, so that the table does not move when the last of them are here.
        <p className="mb-2 min-h-5 text-ink3 text-note" role="status">
          {isPart &&
            error === undefined &&
            `${stars.length} of ${total} stars are here; the others are on their way.`}
        </p>
      )}
      <StarTable
        collaboration={collaboration}
        stars={stars}
        surveys={surveys}
        yardstick={list.yardstick}
      />
    </>
  );
}
