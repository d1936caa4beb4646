'use client';

import { useExercises } from '@/components/hooks/use-exercises';
import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { ExerciseView } from '@/lib/schemas/exercises';
import { dueWords, ownWords } from './exercise-words';

interface ExerciseListProps {
  collaboration: string;
  initial: ExerciseView[];
  canSet: boolean;
}

/** Every exercise with its last day, and how far the reader or everybody is. */
export function ExerciseList({ collaboration, initial, canSet }: ExerciseListProps) {
  const { data: exercises = initial } = useExercises(collaboration, initial);
  const setOne = canSet && (
    <LinkButton href={`/${collaboration}/exercises/new`} variant="primary" icon="add">
      Set an exercise
    </LinkButton>
  );
  return (
    <>
      <PageTitle
        title="Exercises"
        crumbs={[{ href: `/${collaboration}/analyses`, label: 'Analyses' }, { label: 'exercises' }]}
        context="An analysis as a task: begin with a draft of your own, change what is open, hand in a run"
        actions={exercises.length > 0 && setOne}
      />
      {exercises.length === 0 ? (
        <EmptyState title="No exercise yet" actions={setOne}>
          {canSet
            ? 'Choose a finished run as the reference, write the task, and say what may be changed. Students begin with a draft of their own; you see what they hand in beside the reference.'
            : 'Statisticians, authors and owners set exercises. One that is shared stands here.'}
        </EmptyState>
      ) : (
        <section className="pb-10">
          <SectionOpener title="Tasks" help="exercise" context="newest first" />
          <Table caption="Exercises">
            <TableHead>
              <tr>
                <HeadCell>exercise</HeadCell>
                <HeadCell>reference</HeadCell>
                <HeadCell>last day</HeadCell>
                <HeadCell>you</HeadCell>
                {canSet && <HeadCell isNumeric>begun</HeadCell>}
                {canSet && <HeadCell isNumeric>handed in</HeadCell>}
              </tr>
            </TableHead>
            <TableBody>
              {exercises.map((exercise) => (
                <Row key={exercise.id}>
                  <Cell isRowHead className="min-w-48">
                    <Link href={`/${collaboration}/exercises/${exercise.key}`}>
                      {exercise.title}
                    </Link>
                    {!exercise.isShared && (
                      <span className="ml-2 font-normal">
                        <StateMark kind="draft">not shared</StateMark>
                      </span>
                    )}
                  </Cell>
                  <Cell className="whitespace-nowrap">
                    {exercise.reference.run.analysis}, run {exercise.reference.run.number}
                  </Cell>
                  <Cell className="whitespace-nowrap">{dueWords(exercise)}</Cell>
                  <Cell className="whitespace-nowrap">{ownWords(exercise)}</Cell>
                  {canSet && <Cell isNumeric>{exercise.counts?.started ?? 0}</Cell>}
                  {canSet && <Cell isNumeric>{exercise.counts?.submissions ?? 0}</Cell>}
                </Row>
              ))}
            </TableBody>
          </Table>
        </section>
      )}
    </>
  );
}
