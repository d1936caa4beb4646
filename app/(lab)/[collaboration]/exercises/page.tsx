import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ExerciseList } from '@/components/exercises/exercise-list';
import { may } from '@/lib/access/permissions';
import { listExercises } from '@/lib/services/exercises';

export const metadata: Metadata = { title: 'Exercises' };

export default async function ExercisesPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { exercises } = await listExercises(actor);
  return (
    <ExerciseList
      collaboration={actor.collaboration}
      initial={exercises}
      canSet={may(actor, 'make-exercise')}
    />
  );
}
