'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { ExerciseDetail, ParticipantView, SubmissionView } from '@/lib/schemas/exercises';
import { CommentDialog } from './comment-dialog';
import { spanWords } from './exercise-words';
import { StatedLimit } from './stated-limit';

interface SubmissionTableProps {
  collaboration: string;
  exercise: ExerciseDetail;
  /** Everybody's, with a way to answer; else the reader's own. */
  isEverybody: boolean;
  onChanged(): void;
}

/** Columns that narrower screens fold under the person and under the limit. */
const fromMiddle = 'max-md:hidden';
const fromWide = 'max-xl:hidden';

const stateWords = { 'not-begun': 'not begun', begun: 'begun', 'handed-in': 'handed in' } as const;

/** A row a submission, and one for whoever has not handed in: who, what changed, what came out. */
export function SubmissionTable(props: SubmissionTableProps) {
  const { collaboration, exercise, isEverybody, onChanged } = props;
  const [answered, setAnswered] = useState<{ who: string; submission: SubmissionView }>();
  const columns = isEverybody ? 7 : 5;
  return (
    <>
      <Table caption={isEverybody ? 'What everybody handed in' : 'What you handed in'}>
        <TableHead>
          <tr>
            {isEverybody && <HeadCell>person</HeadCell>}
            {isEverybody && <HeadCell className={fromWide}>state</HeadCell>}
            <HeadCell className={isEverybody ? fromWide : ''}>run</HeadCell>
            <HeadCell className={fromWide}>what changed</HeadCell>
            <HeadCell className="max-md:whitespace-normal">limit with its conditions</HeadCell>
            <HeadCell className={fromWide}>against the reference</HeadCell>
            <HeadCell className={fromMiddle}>remark and answer</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {exercise.participants.map((participant) =>
            participant.submissions.length === 0 ? (
              <WaitingRow key={participant.person.id} participant={participant} columns={columns} />
            ) : (
              participant.submissions.map((submission, at) => {
                const state = (
                  <SubmissionState participant={participant} submission={submission} at={at} />
                );
                const run = <RunLink collaboration={collaboration} submission={submission} />;
                const words = (
                  <Words
                    submission={submission}
                    onAnswer={
                      isEverybody
                        ? () => setAnswered({ who: participant.person.name, submission })
                        : undefined
                    }
                  />
                );
                return (
                  <Row key={submission.id} className="[&>td]:align-top [&>th]:align-top">
                    {isEverybody && (
                      <Cell isRowHead className="min-w-[116px] md:whitespace-nowrap">
                        {at === 0 ? (
                          participant.person.name
                        ) : (
                          <span className="sr-only">{participant.person.name}</span>
                        )}
                        <span className="block font-normal xl:hidden">
                          {state}
                          <span className="block whitespace-nowrap">{run}</span>
                        </span>
                      </Cell>
                    )}
                    {isEverybody && (
                      <Cell className={`whitespace-nowrap ${fromWide}`}>{state}</Cell>
                    )}
                    <Cell className={`whitespace-nowrap ${isEverybody ? fromWide : ''}`}>
                      {run}
                    </Cell>
                    <Cell className={`min-w-44 ${fromWide}`}>{changedWords(submission)}</Cell>
                    <Cell className="md:min-w-64">
                      <StatedLimit stated={submission.stated} />
                      <dl className="xl:hidden">
                        <FoldedFact name="against the reference">
                          {submission.difference}
                        </FoldedFact>
                        <FoldedFact name="what changed">{changedWords(submission)}</FoldedFact>
                      </dl>
                      <div className="mt-1 md:hidden">{words}</div>
                    </Cell>
                    <Cell className={`whitespace-nowrap ${fromWide}`}>{submission.difference}</Cell>
                    <Cell className={`min-w-56 ${fromMiddle}`}>{words}</Cell>
                  </Row>
                );
              })
            ),
          )}
        </TableBody>
      </Table>
      {answered && (
        <CommentDialog
          collaboration={collaboration}
          exerciseKey={exercise.key}
          who={answered.who}
          submission={answered.submission}
          onClose={() => setAnswered(undefined)}
          onSaved={() => {
            setAnswered(undefined);
            onChanged();
          }}
        />
      )}
    </>
  );
}

function WaitingRow({ participant, columns }: { participant: ParticipantView; columns: number }) {
  const state = (
    <StateMark kind={participant.state === 'begun' ? 'running' : 'waiting'}>
      {stateWords[participant.state]}
    </StateMark>
  );
  return (
    <Row>
      <Cell isRowHead className="min-w-[116px] md:whitespace-nowrap">
        {participant.person.name}
        <span className="block font-normal xl:hidden">{state}</span>
      </Cell>
      <Cell className={`whitespace-nowrap ${fromWide}`}>{state}</Cell>
      <Cell colSpan={columns - 2} className="text-ink3">
        {participant.analysis === null ? '' : `draft ${participant.analysis}`}
      </Cell>
    </Row>
  );
}

const changedWords = ({ differences }: SubmissionView) =>
  differences.length === 0 ? 'nothing' : differences.join('; ');

/** Whether it is the newest of the person, and how long it took. */
function SubmissionState({
  participant,
  submission,
  at,
}: {
  participant: ParticipantView;
  submission: SubmissionView;
  at: number;
}) {
  return (
    <>
      <StateMark kind={at === 0 ? 'ok' : 'draft'}>
        {at === 0 ? stateWords[participant.state] : 'earlier'}
      </StateMark>
      {participant.startedAt !== null && (
        <span className="block text-chart text-ink3">
          after {spanWords(participant.startedAt, submission.submittedAt)}
        </span>
      )}
    </>
  );
}

function RunLink({
  collaboration,
  submission: { run },
}: {
  collaboration: string;
  submission: SubmissionView;
}) {
  return (
    <>
      <Link
        className="underline underline-offset-3"
        href={`/${collaboration}/analyses/${run.analysis}`}
      >
        {run.analysis}
      </Link>
      , run {run.number}
    </>
  );
}

function FoldedFact({ name, children }: { name: string; children: string }) {
  return (
    <div>
      <dt className="inline text-ink3">{name}: </dt>
      <dd className="inline">{children}</dd>
    </div>
  );
}

interface WordsProps {
  submission: SubmissionView;
  /** Given to whoever may answer. */
  onAnswer?(): void;
}

function Words({ submission: { remark, comment, commentedBy }, onAnswer }: WordsProps) {
  return (
    <>
      <p className="max-w-[48ch] whitespace-pre-line">{remark === '' ? 'no remark' : remark}</p>
      {comment !== null && (
        <p className="mt-1 max-w-[48ch] whitespace-pre-line border-rule2 border-l-2 pl-2 text-ink2">
          <span className="text-ink3">{commentedBy ?? 'somebody who left'}: </span>
          {comment}
        </p>
      )}
      {onAnswer && (
        <Button size="small" className="mt-1" onClick={onAnswer}>
          {comment === null ? 'Answer' : 'Change the answer'}
        </Button>
      )}
    </>
  );
}
