'use client';

import { useRouter } from 'next/navigation';
import { useShares } from '@/components/hooks/use-sharing';
import { SectionOpener } from '@/components/ui/section-opener';
import type { Shares } from '@/lib/schemas/sharing';
import { ShareList } from './share-list';
import { spacedCode } from './share-words';

/** Under the list of surveys: what others offer, what is offered to others, and the code for it. */
export function SharingSection({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: Shares;
}) {
  const { data = initial, mutate } = useShares(collaboration, initial);
  const router = useRouter();
  const onChanged = () => {
    void mutate();
    router.refresh();
  };
  const received = data.shares.filter(({ direction }) => direction === 'received');
  const given = data.shares.filter(({ direction }) => direction === 'given');
  return (
    <section id="sharing" className="mt-10 scroll-mt-4">
      <SectionOpener title="Sharing" context="with other collaborations" />
      <p className="py-2 text-ink2">
        Sharing code of this collaboration:{' '}
        <b className="whitespace-nowrap">{spacedCode(data.code)}</b>. Another collaboration offers
        you a survey with it. To offer one of yours, open it and use Sharing.
      </p>
      <div className="grid gap-x-14 gap-y-6 xl:grid-cols-2">
        <div className="min-w-0">
          <h3 className="mt-2 font-semibold">From others</h3>
          {received.length === 0 ? (
            <p className="py-2 text-ink3">No survey was offered to this collaboration.</p>
          ) : (
            <ShareList collaboration={collaboration} shares={received} onChanged={onChanged} />
          )}
        </div>
        <div className="min-w-0">
          <h3 className="mt-2 font-semibold">To others</h3>
          {given.length === 0 ? (
            <p className="py-2 text-ink3">No survey of this collaboration is offered.</p>
          ) : (
            <ShareList collaboration={collaboration} shares={given} onChanged={onChanged} />
          )}
        </div>
      </div>
    </section>
  );
}
