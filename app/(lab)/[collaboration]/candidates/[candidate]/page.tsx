import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { NotesOf } from '@/app/(lab)/[collaboration]/notes-of';
import { currentActor } from '@/app/session';
import { CandidateScreen } from '@/components/candidates/candidate-screen';
import { NotFound } from '@/lib/errors';
import { getCandidate } from '@/lib/services/candidates/detail';

export const metadata: Metadata = { title: 'Candidate' };

export default async function CandidatePage({
  params,
}: {
  params: Promise<{ collaboration: string; candidate: string }>;
}) {
  const { collaboration, candidate } = await params;
  const actor = await currentActor(collaboration);
  try {
    const initial = await getCandidate(actor, candidate);
    return (
      <>
        <CandidateScreen collaboration={actor.collaboration} initial={initial} />
        <NotesOf actor={actor} on={{ kind: 'candidate', key: candidate }} />
      </>
    );
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}
