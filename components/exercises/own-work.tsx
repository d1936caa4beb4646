'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { beginExercise, handIn } from '@/components/hooks/use-exercises';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import type { ExerciseDetail } from '@/lib/schemas/exercises';
import { dueWords } from './exercise-words';

interface OwnWorkProps {
  collaboration: string;
  exercise: ExerciseDetail;
  onChanged(): void;
}

/** The reader's own way through it: begin, change and run the draft, hand in. */
export function OwnWork({ collaboration, exercise, onChanged }: OwnWorkProps) {
  const { own, can } = exercise;
  const router = useRouter();
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const begin = () =>
    perform(async () => {
      const { analysis } = await beginExercise(collaboration, exercise.key);
      router.push(`/${collaboration}/analyses/${analysis}`);
    });
  return (
    <section>
      <SectionOpener title="Your work" context={dueWords(exercise)} />
      {own === null ? (
        <>
          <p className="mb-3 max-w-[60ch] text-ink2">
            {can.begin
              ? 'Beginning makes a draft of your own with the recipe of the reference. Change what is open, run it, and come back to hand the run in.'
              : exercise.isShared
                ? 'Its last day is over: it can no longer be begun.'
                : 'It is not shared yet: nobody can begin it.'}
          </p>
          {can.begin && (
            <Button variant="primary" onClick={begin} isBusy={isBusy}>
              Begin with a draft of my own
            </Button>
          )}
        </>
      ) : (
        <div className="grid gap-4">
          <div className="flex flex-wrap gap-2">
            <LinkButton href={`/${collaboration}/analyses/${own.analysis}`} icon="forward">
              Open {own.analysis}, your draft
            </LinkButton>
          </div>
          {can.submit ? (
            <HandIn collaboration={collaboration} exercise={exercise} onChanged={onChanged} />
          ) : (
            <p className="text-ink2">Its last day is over: no further run can be handed in.</p>
          )}
        </div>
      )}
      {problem !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title="It was not begun." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
    </section>
  );
}

function HandIn({ collaboration, exercise, onChanged }: OwnWorkProps) {
  const { ready } = exercise;
  const [chosen, setChosen] = useState('');
  const [remark, setRemark] = useState('');
  const { perform, isBusy, problem } = useAction();
  const runId = ready.some(({ id }) => id === chosen) ? chosen : ready[0]?.id;
  if (runId === undefined) {
    return (
      <p className="max-w-[60ch] text-ink2">
        No finished run that was not handed in already. Change the draft and run it; the run then
        stands here.
      </p>
    );
  }
  const send = () =>
    perform(async () => {
      await handIn(collaboration, exercise.key, runId, remark);
      setRemark('');
      onChanged();
    });
  return (
    <div className="grid max-w-[640px] gap-3">
      <SelectField
        label="Run to hand in"
        value={runId}
        onChange={(event) => setChosen(event.target.value)}
        options={ready.map(({ id, number, analysis, sentence }) => ({
          value: id,
          label: `${analysis}, run ${number}: ${sentence}`,
        }))}
      />
      <TextAreaField
        label="Remark"
        hint="What you found, in your own words."
        value={remark}
        maxLength={2000}
        onChange={(event) => setRemark(event.target.value)}
      />
      {problem !== undefined && (
        <Notice tone="bad" title="It was not handed in." isAnnounced>
          {problem}
        </Notice>
      )}
      <div>
        <Button variant="primary" onClick={send} isBusy={isBusy}>
          Hand in this run
        </Button>
      </div>
    </div>
  );
}
