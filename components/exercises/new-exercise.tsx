'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { type Resolver, useForm } from 'react-hook-form';
import { sentenceOf } from '@/components/hooks/api-problem';
import { createExercise } from '@/components/hooks/use-exercises';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import { changeableParts, partNames } from '@/lib/schemas/exercise-parts';
import type { CreateExercise } from '@/lib/schemas/exercises';

/** The schema comes with the first check: the form is drawn without it. */
const resolver: Resolver<CreateExercise> = async (...asked) => {
  const [{ zodResolver }, { createExerciseSchema }] = await Promise.all([
    import('@hookform/resolvers/zod'),
    import('@/lib/schemas/exercises'),
  ]);
  return zodResolver(createExerciseSchema)(...asked);
};

/** A finished run that an exercise may be held against. */
export interface RunChoice {
  id: string;
  label: string;
}

/** Sets an exercise: the reference, the task, what is open, until when. */
export function NewExercise({ collaboration, runs }: { collaboration: string; runs: RunChoice[] }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string>();
  const { register, handleSubmit, formState } = useForm<CreateExercise>({
    resolver,
    defaultValues: {
      title: '',
      task: '',
      runId: runs[0]?.id,
      mayChange: ['detections', 'prior'],
      dueOn: null,
      isShared: true,
    },
  });
  const { errors, isSubmitting } = formState;
  const save = handleSubmit(async (body) => {
    setProblem(undefined);
    try {
      const made = await createExercise(collaboration, body);
      router.push(`/${collaboration}/exercises/${made.key}`);
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
  });
  return (
    <>
      <PageTitle
        title="Set an exercise"
        crumbs={[{ href: `/${collaboration}/exercises`, label: 'Exercises' }, { label: 'new' }]}
      />
      {runs.length === 0 ? (
        <EmptyState title="No finished run yet">
          An exercise is held against a finished run. Run an analysis first.
        </EmptyState>
      ) : (
        <form onSubmit={save} noValidate className="grid max-w-[640px] gap-5 pb-12">
          <SelectField
            label="Reference"
            hint="Drafts begin with its recipe; what is handed in stands beside its limit."
            options={runs.map(({ id, label }) => ({ value: id, label }))}
            error={errors.runId?.message}
            {...register('runId')}
          />
          <TextField label="Title" error={errors.title?.message} {...register('title')} />
          <TextAreaField
            label="Task"
            rows={6}
            hint="What to do, and what to say about it in the remark."
            error={errors.task?.message}
            {...register('task')}
          />
          <fieldset>
            <legend className="mb-1 text-ink2 text-note">What may be changed</legend>
            <div className="grid gap-x-6 sm:grid-cols-2">
              {changeableParts.map((part) => (
                <CheckboxField
                  key={part}
                  value={part}
                  label={partNames[part]}
                  {...register('mayChange')}
                />
              ))}
            </div>
            {errors.mayChange && (
              <p className="mt-1 text-bad text-note" role="alert">
                {errors.mayChange.message}
              </p>
            )}
          </fieldset>
          <TextField
            type="date"
            label="Last day, UTC"
            hint="Left empty, it stays open."
            error={errors.dueOn?.message}
            {...register('dueOn', { setValueAs: (text) => text || null })}
          />
          <CheckboxField
            label="Share it now"
            hint="Everybody in the collaboration reads it and may begin it."
            {...register('isShared')}
          />
          {problem !== undefined && (
            <Notice tone="bad" title="It was not set." isAnnounced>
              {problem}
            </Notice>
          )}
          <div>
            <Button type="submit" variant="primary" isBusy={isSubmitting}>
              Set the exercise
            </Button>
          </div>
        </form>
      )}
    </>
  );
}
