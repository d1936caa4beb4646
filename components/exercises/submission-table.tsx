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
            {isEverybody && <HeadCell>state</HeadCell>}
            <HeadCell>run</HeadCell>
            <HeadCell>what changed</HeadCell>
            <HeadCell>limit with its conditions</HeadCell>
            <HeadCell>against the reference</HeadCell>
            <HeadCell>remark and answer</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {exercise.participants.map((participant) =>
            participant.submissions.length === 0 ? (
              <WaitingRow key={participant.person.id} participant={participant} columns={columns} />
            ) : (
              participant.submissions.map((submission, at) => (
                <Row key={submission.id} className="[&>td]:align-top [&>th]:align-top">
                  {isEverybody && (
                    <Cell isRowHead className="whitespace-nowrap">
                      {at === 0 ? (
                        participant.person.name
                      ) : (
                        <span className="sr-only">{participant.person.name}</span>
                      )}
                    </Cell>
                  )}
                  {isEverybody && (
                    <Cell className="whitespace-nowrap">
                      <StateMark kind={at === 0 ? 'ok' : 'draft'}>
                        {at === 0 ? stateWords[participant.state] : 'earlier'}
                      </StateMark>
                      {participant.startedAt !== null && (
                        <span className="block text-chart text-ink3">
                          after {spanWords(participant.startedAt, submission.submittedAt)}
                        </span>
                      )}
                    </Cell>
                  )}
                  <Cell className="whitespace-nowrap">
                    <Link
                      className="underline underline-offset-3"
                      href={`/${collaboration}/analyses/${submission.run.analysis}`}
                    >
                      {submission.run.analysis}
                    </Link>
                    , run {submission.run.number}
                  </Cell>
                  <Cell className="min-w-44">
                    {submission.differences.length === 0
                      ? 'nothing'
                      : submission.differences.join('; ')}
                  </Cell>
                  <Cell className="min-w-64">
                    <StatedLimit stated={submission.stated} />
                  </Cell>
                  <Cell className="whitespace-nowrap">{submission.difference}</Cell>
                  <Cell className="min-w-56">
                    <Words submission={submission} />
                    {isEverybody && (
                      <Button
                        size="small"
                        className="mt-1"
                        onClick={() => setAnswered({ who: participant.person.name, submission })}
                      >
                        {submission.comment === null ? 'Answer' : 'Change the answer'}
                      </Button>
                    )}
                  </Cell>
                </Row>
              ))
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
  return (
    <Row>
      <Cell isRowHead className="whitespace-nowrap">
        {participant.person.name}
      </Cell>
      <Cell className="whitespace-nowrap">
        <StateMark kind={participant.state === 'begun' ? 'running' : 'waiting'}>
          {stateWords[participant.state]}
        </StateMark>
      </Cell>
      <Cell colSpan={columns - 2} className="text-ink3">
        {participant.analysis === null ? '' : `draft ${participant.analysis}`}
      </Cell>
    </Row>
  );
}

function Words({ submission: { remark, comment, commentedBy } }: { submission: SubmissionView }) {
  return (
    <>
      <p className="max-w-[48ch] whitespace-pre-line">{remark === '' ? 'no remark' : remark}</p>
      {comment !== null && (
        <p className="mt-1 max-w-[48ch] whitespace-pre-line border-rule2 border-l-2 pl-2 text-ink2">
          <span className="text-ink3">{commentedBy ?? 'somebody who left'}: </span>
          {comment}
        </p>
      )}
    </>
  );
}
