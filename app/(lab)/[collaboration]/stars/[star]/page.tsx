import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { NotesOf } from '@/app/(lab)/[collaboration]/notes-of';
import { currentActor } from '@/app/session';
import { StarScreen } from '@/components/stars/star-screen';
import { NotFound } from '@/lib/errors';
import { getStar } from '@/lib/services/stars';

export const metadata: Metadata = { title: 'Star' };

export default async function StarPage({
  params,
}: {
  params: Promise<{ collaboration: string; star: string }>;
}) {
  const { collaboration, star } = await params;
  const actor = await currentActor(collaboration);
  try {
    return (
      <>
        <StarScreen collaboration={actor.collaboration} initial={await getStar(actor, star)} />
        <NotesOf actor={actor} on={{ kind: 'star', key: star }} />
      </>
    );
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}
