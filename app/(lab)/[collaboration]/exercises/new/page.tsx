import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { isFinished } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { NewExercise } from '@/components/exercises/new-exercise';
import { may } from '@/lib/access/permissions';
import { listAnalyses } from '@/lib/services/analyses';

export const metadata: Metadata = { title: 'Set an exercise' };

export default async function NewExercisePage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<{ analysis?: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  if (!may(actor, 'make-exercise')) notFound();
  const { analysis: wanted } = await searchParams;
  const { analyses } = await listAnalyses(actor);
  // The newest finished run of each analysis; the one that was asked for comes first.
  const runs = analyses
    .flatMap(({ key, name, runs: all }) => {
      const run = all.find(isFinished);
      return run ? [{ id: run.id, key, label: `${key}, run ${run.number}: ${name}` }] : [];
    })
    .sort((a, b) => Number(b.key === wanted) - Number(a.key === wanted));
  return <NewExercise collaboration={actor.collaboration} runs={runs} />;
}
