import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import type { StudySummary } from '@/lib/schemas/studies';

interface EarlierAnswersProps {
  studies: StudySummary[];
  shownId: string | undefined;
  settingsInWords(study: StudySummary): string;
  onShow(id: string): void;
}

/** All answers to one kind of question, newest first; a press shows another one. */
export function EarlierAnswers({ studies, shownId, settingsInWords, onShow }: EarlierAnswersProps) {
  const day = useDay();
  const askedBy = ({ createdBy, createdAt }: StudySummary) =>
    `${createdBy ?? 'a former member'}, ${day(createdAt)}`;
  return (
    <Table caption="Questions of this kind that were asked, newest first">
      <TableHead>
        <tr>
          <HeadCell>question</HeadCell>
          <HeadCell className="max-md:hidden">settings</HeadCell>
          <HeadCell>answer</HeadCell>
          <HeadCell className="max-md:hidden">asked by</HeadCell>
          <HeadCell className="max-md:hidden">of</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {studies.map((study) => (
          <Row key={study.id} isSelected={study.id === shownId}>
            <Cell isRowHead>
              {study.job.status !== 'done' || study.id === shownId ? (
                study.number
              ) : (
                <TextAction onClick={() => onShow(study.id)}>
                  {study.number}
                  <span className="sr-only">, show this answer</span>
                </TextAction>
              )}
            </Cell>
            <Cell className="min-w-44 max-md:hidden">{settingsInWords(study)}</Cell>
            <Cell className="md:min-w-56">
              <AnswerState study={study} />
              <span className="block text-chart text-ink3 md:hidden">
                {settingsInWords(study)}; {askedBy(study)}; of run {study.run.number}
              </span>
            </Cell>
            <Cell className="whitespace-nowrap max-md:hidden">{askedBy(study)}</Cell>
            <Cell className="whitespace-nowrap max-md:hidden">run {study.run.number}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** The headline, or the state of the job in a word. */
export function AnswerState({ study }: { study: StudySummary }) {
  const { job, headline } = study;
  switch (job.status) {
    case 'waiting':
      return <StateMark kind="waiting">waiting for a worker</StateMark>;
    case 'running':
      return (
        <StateMark kind="running">
          running{job.total > 1 && `, ${job.done} of ${job.total}`}
        </StateMark>
      );
    case 'failed':
      return <StateMark kind="bad">no answer: {job.fault ?? 'it gave no reason'}</StateMark>;
    case 'cancelled':
      return <StateMark kind="stopped">stopped</StateMark>;
    case 'done':
      return <>{headline ?? 'answered'}</>;
  }
}
