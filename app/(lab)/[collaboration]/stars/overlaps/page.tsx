import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { OverlapBoard } from '@/components/stars/overlap-board';
import { PageTitle } from '@/components/ui/page-title';
import { listOverlaps } from '@/lib/services/star-overlaps';

export const metadata: Metadata = { title: 'Overlaps' };

export default async function OverlapsPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  return (
    <>
      <PageTitle title="Overlaps" context="a star counts once" />
      <OverlapBoard collaboration={actor.collaboration} initial={await listOverlaps(actor)} />
    </>
  );
}
