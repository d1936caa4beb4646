import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { ExerciseScreen } from '@/components/exercises/exercise-screen';
import { NotFound } from '@/lib/errors';
import { getExercise } from '@/lib/services/exercises';

type Params = { params: Promise<{ collaboration: string; exercise: string }> };

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  return { title: `Exercise ${(await params).exercise}` };
}

export default async function ExercisePage({ params }: Params) {
  const { collaboration, exercise } = await params;
  const actor = await currentActor(collaboration);
  const initial = await getExercise(actor, exercise).catch((error: unknown) => {
    if (error instanceof NotFound) notFound();
    throw error;
  });
  return <ExerciseScreen collaboration={actor.collaboration} initial={initial} />;
}
