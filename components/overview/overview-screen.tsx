'use client';

import dynamic from 'next/dynamic';
import { useOverview } from '@/components/hooks/use-overview';
import { EmptyState } from '@/components/ui/empty-state';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { useMoment, useTimeZone } from '@/components/ui/time-zone';
import type { FirstStep } from '@/lib/schemas/first-steps';
import type { Overview } from '@/lib/schemas/overview';
import { ExampleFiles, FirstSteps } from './first-steps';
import { LeadPlate } from './lead-plate';

/** Drawn by the server; what makes them live comes after the rest of the page. */
const AnalysisTable = dynamic(
  async () => (await import('@/components/analyses/analysis-table')).AnalysisTable,
);
const SurveyTable = dynamic(
  async () => (await import('@/components/surveys/survey-table')).SurveyTable,
);
const OverlapChart = dynamic(async () => (await import('./overlap-chart')).OverlapChart);

function Waiting({ waiting }: { waiting: Overview['waiting'] }) {
  if (waiting.length === 0) return <p className="py-2 text-ink3">Nothing waits for a person.</p>;
  return (
    <ul>
      {waiting.map((item) => (
        <li
          key={`${item.fact}-${item.address}`}
          className="flex items-start gap-3 border-rule border-b py-2.5 text-[14px]"
        >
          <span className="mt-0.5 text-warn">
            <Icon name="warn" size={16} />
          </span>
          <span className="min-w-0 flex-1">
            <span className="font-semibold">{item.fact}</span>
            <span className="block text-ink3">{item.detail}</span>
          </span>
          <Link className="font-semibold" href={item.address}>
            {item.verb}
            <span className="sr-only">: {item.fact}</span>
          </Link>
        </li>
      ))}
    </ul>
  );
}

function Log({ log }: { log: Overview['log'] }) {
  const moment = useMoment();
  if (log.length === 0) return <p className="py-2 text-ink3">Nothing has happened yet.</p>;
  return (
    <ul>
      {log.slice(0, 8).map((entry) => (
        <li
          key={`${entry.at}-${entry.what}`}
          className="grid grid-cols-[104px_1fr] gap-x-2 py-1 text-[14px]"
        >
          <span className="whitespace-nowrap text-ink3">{moment(entry.at)}</span>
          <span className="min-w-0 break-words">
            <b className="font-semibold">{entry.who}</b> {entry.what}
          </span>
        </li>
      ))}
    </ul>
  );
}

/** Where do we stand, what waits for me? */
export function OverviewScreen({
  collaboration,
  initial,
  steps,
  hasDemonstration,
}: {
  collaboration: string;
  initial: Overview;
  /** First steps of the reader's role. */
  steps: FirstStep[];
  /** There is a collaboration of invented data besides this one. */
  hasDemonstration: boolean;
}) {
  const timeZone = useTimeZone();
  const { data: overview = initial } = useOverview(collaboration, initial);
  const { surveys: list, analyses, can } = overview;
  const lead = analyses.find((analysis) => analysis.key === overview.lead);
  const base = `/${collaboration}`;
  const isEmpty = list.surveys.length === 0;
  return (
    <>
      <PageTitle
        title={overview.name}
        context={`${overview.people} ${overview.people === 1 ? 'person' : 'people'}, ${list.surveys.length} ${list.surveys.length === 1 ? 'survey' : 'surveys'}, ${list.stars} stars`}
        actions={
          <>
            {can.invite && (
              <LinkButton href={`${base}/people`} icon="mail">
                Invite people
              </LinkButton>
            )}
            {can.addSurvey && !isEmpty && (
              <LinkButton href={`${base}/surveys/new`} icon="add">
                Add a survey
              </LinkButton>
            )}
            {can.addAnalysis && !isEmpty && (
              <LinkButton href={`${base}/analyses/new`} variant="primary" icon="add">
                New analysis
              </LinkButton>
            )}
          </>
        }
      />
      {lead && (
        <div className="mt-1">
          <LeadPlate collaboration={collaboration} overview={overview} lead={lead} />
        </div>
      )}
      {isEmpty ? (
        <div className="mt-8">
          <EmptyState
            title="No survey yet"
            actions={
              can.addSurvey && (
                <LinkButton href={`${base}/surveys/new`} variant="primary" icon="add">
                  Add a survey
                </LinkButton>
              )
            }
          >
            Bring one file of targets (name, distance, age, each with its error) and one contrast
            curve a star. You see every line checked before anything is stored.
          </EmptyState>
          <div className="mt-9 grid gap-x-14 gap-y-9 lg:grid-cols-2">
            <FirstSteps collaboration={collaboration} steps={steps} />
            <ExampleFiles hasDemonstration={hasDemonstration} />
          </div>
        </div>
      ) : (
        <div className="mt-8 grid gap-x-14 gap-y-9 xl:grid-cols-[minmax(0,7fr)_minmax(0,3fr)]">
          <div className="flex min-w-0 flex-col gap-9">
            <section>
              <SectionOpener
                title="Surveys"
                tools={can.addSurvey && <Link href={`${base}/surveys/new`}>Add a survey</Link>}
              />
              <SurveyTable collaboration={collaboration} list={list} />
            </section>
            <section>
              <SectionOpener
                title="Analyses"
                help="upper-limit"
                context={
                  <>
                    upper limits<span className="max-lg:hidden">; box: 68{'\u2009'}% interval</span>
                  </>
                }
                tools={can.addAnalysis && <Link href={`${base}/analyses/new`}>New analysis</Link>}
              />
              <AnalysisTable collaboration={collaboration} analyses={analyses} />
            </section>
          </div>
          <div className="flex min-w-0 flex-col gap-9">
            {steps.some(({ isDone }) => !isDone) && (
              <FirstSteps collaboration={collaboration} steps={steps} />
            )}
            <section>
              <SectionOpener title="Waiting for a person" />
              <Waiting waiting={overview.waiting} />
            </section>
            <section>
              <SectionOpener
                title="Overlaps"
                help="shared-stars"
                context={`${list.entries} entries, ${list.stars} stars`}
              />
              <OverlapChart list={list} />
              <p className="mt-2 text-[14px] text-ink3">
                A star in several surveys has one combined map and counts once.
              </p>
            </section>
            <section>
              <SectionOpener
                title="Log"
                context={timeZone}
                tools={<Link href={`${base}/activity`}>All activity</Link>}
              />
              <Log log={overview.log} />
            </section>
          </div>
        </div>
      )}
    </>
  );
}
