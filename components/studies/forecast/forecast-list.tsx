'use client';

import { sentenceOf } from '@/components/hooks/api-problem';
import { useStudiesOfKind } from '@/components/hooks/use-studies';
import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useDay } from '@/components/ui/time-zone';
import type { StudySummary } from '@/lib/schemas/studies';
import { AnswerState } from '../earlier-answers';
import { plannedInWords } from './forecast-words';

interface ForecastListProps {
  collaboration: string;
  initial: StudySummary[];
  canCreate: boolean;
  /** A forecast starts from a finished run. */
  hasRun: boolean;
}

/** All forecasts of the collaboration, newest first. */
export function ForecastList({ collaboration, initial, canCreate, hasRun }: ForecastListProps) {
  const { data: studies = initial, error } = useStudiesOfKind(collaboration, 'forecast');
  const newButton = canCreate && hasRun && (
    <LinkButton href={`/${collaboration}/forecasts/new`} variant="primary" icon="add">
      New forecast
    </LinkButton>
  );
  return (
    <>
      <PageTitle
        title="Forecasts"
        context="What a planned survey would find, and what it would say if it finds nothing."
        actions={studies.length > 0 && newButton}
      />
      {error !== undefined && (
        <div className="mb-4">
          <Notice tone="bad" title="The list could not be fetched anew.">
            {sentenceOf(error)}
          </Notice>
        </div>
      )}
      {studies.length === 0 ? (
        <EmptyState
          title="No forecast yet"
          actions={
            newButton || (
              <LinkButton href={`/${collaboration}/analyses`}>Go to the analyses</LinkButton>
            )
          }
        >
          A forecast takes a finished run and a planned survey, so many stars like those of the run
          or a list of targets with an assumed curve. It says how many companions would be found,
          how low the limit would be if none is, and which stars to observe first. It is marked as a
          forecast wherever it is shown.
          {!hasRun && ' It needs a finished run: run an analysis first.'}
        </EmptyState>
      ) : (
        <section className="min-w-0 pb-10">
          <SectionOpener
            title="Asked so far"
            context="limits if nothing is found, each with the level, ranges and prior of its run"
          />
          <ForecastTable collaboration={collaboration} studies={studies} />
        </section>
      )}
    </>
  );
}

function ForecastTable({
  collaboration,
  studies,
}: {
  collaboration: string;
  studies: StudySummary[];
}) {
  const day = useDay();
  const askedBy = ({ createdBy, createdAt }: StudySummary) =>
    `${createdBy ?? 'a former member'}, ${day(createdAt)}`;
  return (
    <Table caption="Forecasts, newest first">
      <TableHead>
        <tr>
          <HeadCell>forecast</HeadCell>
          <HeadCell className="max-md:hidden">planned</HeadCell>
          <HeadCell className="max-md:hidden">from</HeadCell>
          <HeadCell>answer</HeadCell>
          <HeadCell className="max-lg:hidden">asked by</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {studies.map((study) =>
          study.settings.kind !== 'forecast' ? null : (
            <Row key={study.id}>
              <Cell isRowHead className="min-w-36 max-md:align-top">
                <Link
                  className="underline underline-offset-3"
                  href={`/${collaboration}/forecasts/${study.id}`}
                >
                  {study.settings.name}
                </Link>
                <span className="block font-normal text-chart text-ink3 lg:hidden">
                  <span className="md:hidden">
                    {plannedInWords(study.settings)}; from {study.run.analysisKey}, run{' '}
                    {study.run.number};{' '}
                  </span>
                  {askedBy(study)}
                </span>
              </Cell>
              <Cell className="min-w-44 max-md:hidden">{plannedInWords(study.settings)}</Cell>
              <Cell className="whitespace-nowrap max-md:hidden">
                <Link
                  className="underline underline-offset-3"
                  href={`/${collaboration}/analyses/${study.run.analysisKey}`}
                >
                  {study.run.analysisKey}
                </Link>
                , run {study.run.number}
              </Cell>
              <Cell className="max-md:align-top md:min-w-56">
                <AnswerState study={study} />
              </Cell>
              <Cell className="whitespace-nowrap max-lg:hidden">{askedBy(study)}</Cell>
            </Row>
          ),
        )}
      </TableBody>
    </Table>
  );
}
