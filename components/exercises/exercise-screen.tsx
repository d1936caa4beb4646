'use client';

import { useState } from 'react';
import { ChangedMeanwhile } from '@/components/hooks/change';
import { useAction } from '@/components/hooks/use-action';
import { useEditing } from '@/components/hooks/use-editing';
import {
  exerciseTableAddress,
  updateExercise,
  useExercise,
} from '@/components/hooks/use-exercises';
import { Button } from '@/components/ui/button';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { Conditions } from '@/components/ui/plate';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { TextField } from '@/components/ui/text-field';
import type { ExerciseDetail } from '@/lib/schemas/exercises';
import { dueWords, handedInWords, openWords } from './exercise-words';
import { OwnWork } from './own-work';
import { StatedLimit } from './stated-limit';
import { SubmissionTable } from './submission-table';

interface ExerciseScreenProps {
  collaboration: string;
  initial: ExerciseDetail;
}

/** An exercise: the task, the reference, the reader's own way, and what was handed in. */
export function ExerciseScreen({ collaboration, initial }: ExerciseScreenProps) {
  const { data: exercise = initial, mutate } = useExercise(collaboration, initial);
  const { reference, can } = exercise;
  const onChanged = () => {
    void mutate();
  };
  const isEverybody = exercise.counts !== null;
  const hasSubmission = exercise.participants.some(({ submissions }) => submissions.length > 0);
  return (
    <>
      <PageTitle
        title={exercise.title}
        crumbs={[
          { href: `/${collaboration}/exercises`, label: 'Exercises' },
          { label: exercise.key },
        ]}
        state={
          exercise.isShared ? (
            <StateMark kind={exercise.isOpen ? 'ok' : 'stopped'}>{dueWords(exercise)}</StateMark>
          ) : (
            <StateMark kind="draft">not shared</StateMark>
          )
        }
      />
      <div className="grid gap-x-14 gap-y-9 lg:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="Task" help="exercise" />
          <p className="max-w-[65ch] whitespace-pre-line text-value">{exercise.task}</p>
          <div className="mt-4">
            <Conditions
              rows={[
                { name: 'Open', value: openWords(exercise) },
                { name: 'Set by', value: exercise.createdBy ?? 'somebody who left' },
              ]}
            />
          </div>
        </section>
        <section className="min-w-0">
          <SectionOpener title="Reference" context={reference.name} help="upper-limit" />
          <StatedLimit stated={reference.stated} />
          <p className="mt-1 text-note">
            <Link href={`/${collaboration}/analyses/${reference.run.analysis}`}>
              {reference.run.analysis}
            </Link>
            , run {reference.run.number}
          </p>
        </section>
        <OwnWork collaboration={collaboration} exercise={exercise} onChanged={onChanged} />
        {can.change && (
          <SettingsSection
            collaboration={collaboration}
            exercise={exercise}
            onChanged={onChanged}
          />
        )}
      </div>
      {(isEverybody || hasSubmission) && (
        <section className="mt-9 pb-12">
          <SectionOpener
            title="Handed in"
            context={
              exercise.counts === null
                ? 'by you'
                : handedInWords(exercise.participants, exercise.counts.started)
            }
            tools={
              isEverybody && (
                <LinkButton
                  href={exerciseTableAddress(collaboration, exercise.key)}
                  icon="download"
                  size="small"
                  isDownload
                >
                  Table, CSV
                </LinkButton>
              )
            }
          />
          <SubmissionTable
            collaboration={collaboration}
            exercise={exercise}
            isEverybody={isEverybody}
            onChanged={onChanged}
          />
        </section>
      )}
    </>
  );
}

/** Until when it is open, and whether everybody sees it. */
function SettingsSection({
  collaboration,
  exercise,
  onChanged,
}: {
  collaboration: string;
  exercise: ExerciseDetail;
  onChanged(): void;
}) {
  const [dueOn, setDueOn] = useState(exercise.dueOn ?? '');
  const { perform, isBusy, problem } = useAction();
  const editing = useEditing(exercise.dueOn);
  const setDay = (day: string | null) =>
    change(() =>
      editing.attempt(day, async (opened) => {
        await updateExercise(collaboration, exercise.key, { dueOn: opened }, { dueOn: day });
        editing.begin(day);
      }),
    );
  const share = ({ isShared }: ExerciseDetail) =>
    change(() =>
      updateExercise(collaboration, exercise.key, { isShared }, { isShared: !isShared }),
    );
  const change = (work: () => Promise<unknown>) =>
    perform(async () => {
      try {
        await work();
        onChanged();
      } catch (reason) {
        if (reason instanceof ChangedMeanwhile) onChanged();
        throw reason;
      }
    });
  return (
    <section className="min-w-0">
      <SectionOpener title="For whoever sets it" />
      <div className="flex flex-wrap items-end gap-3">
        <div className="w-44">
          <TextField
            type="date"
            label="Last day, UTC"
            value={dueOn}
            onChange={(event) => setDueOn(event.target.value)}
          />
        </div>
        <Button
          onClick={() => void setDay(dueOn === '' ? null : dueOn)}
          isBusy={isBusy}
          disabledReason={dueOn === (exercise.dueOn ?? '') ? 'It is this day already.' : undefined}
        >
          Set this day
        </Button>
        <Button onClick={() => void share(exercise)} isBusy={isBusy}>
          {exercise.isShared ? 'Take it back from everybody' : 'Share it'}
        </Button>
      </div>
      <div className="mt-3 empty:hidden">
        <ChangedNotice
          editing={editing}
          words={(day) => ({ 'Last day': day ?? 'none' })}
          onTake={(day) => setDueOn(day ?? '')}
          onKeep={() => void setDay(dueOn === '' ? null : dueOn)}
        />
      </div>
      {problem !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title="It was not changed." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
    </section>
  );
}
