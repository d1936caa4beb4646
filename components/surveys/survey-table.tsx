'use client';

import { useMemo } from 'react';
import { ProbabilityBar } from '@/components/charts/probability-bar';
import { seriesColour } from '@/components/charts/series';
import { Sparkline } from '@/components/charts/sparkline';
import type { DataColumn } from '@/components/ui/data-table/column';
import { DataTable } from '@/components/ui/data-table/data-table';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import type { SurveyList, SurveyView } from '@/lib/schemas/surveys';
import { observedYears } from './observed-years';
import { YardstickLines } from './yardstick-words';

function MapsState({ survey }: { survey: SurveyView }) {
  const { maps, mapJob } = survey;
  const isOpen = mapJob?.status === 'running' || mapJob?.status === 'waiting';
  const count = <span className="whitespace-nowrap">{`${maps.ready} of ${survey.targets}`}</span>;
  if (isOpen) return <StateMark kind="running">{count}</StateMark>;
  if (maps.stale)
    return (
      <StateMark kind="warn">
        {count}, <span className="whitespace-nowrap">{maps.stale} stale</span>
      </StateMark>
    );
  if (maps.failed > 0) return <StateMark kind="warn">{count}</StateMark>;
  if (maps.ready === survey.targets && maps.ready > 0)
    return <StateMark kind="ok">{count}</StateMark>;
  return <StateMark kind="waiting">{count}</StateMark>;
}

/** Columns that a narrow screen leaves to the survey's own page. */
const wide = 'max-md:hidden';
const wider = 'max-lg:hidden';

function SurveyName({ collaboration, survey }: { collaboration: string; survey: SurveyView }) {
  return (
    <span className="inline-flex items-center gap-2 whitespace-nowrap">
      <span
        aria-hidden="true"
        className="size-2.5 shrink-0"
        style={{ background: seriesColour(survey.position) }}
      />
      <Link href={`/${collaboration}/surveys/${survey.slug}`} className="text-ink">
        {survey.name}
      </Link>
      {survey.shared ? (
        <span className="font-normal text-ink3 max-md:hidden">
          {survey.shared.isWithdrawn ? 'withdrawn by' : 'by'} {survey.shared.owner}
        </span>
      ) : (
        survey.isArchived && <span className="font-normal text-ink3">archived</span>
      )}
    </span>
  );
}

function SummedBar({ survey, most }: { survey: SurveyView; most: number }) {
  if (survey.summedCompleteness === null) return '–';
  return (
    <span className="inline-flex items-center justify-end gap-3">
      <span className={wider}>
        <ProbabilityBar
          value={survey.summedCompleteness / most}
          colour={seriesColour(survey.position)}
          width={64}
        />
      </span>
      <span className="lg:min-w-11">{survey.summedCompleteness.toFixed(1)}</span>
    </span>
  );
}

/** A sum over surveys would count the stars of several of them twice. */
function summedOnce(surveys: SurveyView[], sharedStars: number): string {
  const sums = surveys.flatMap(({ summedCompleteness }) => summedCompleteness ?? []);
  if (sharedStars > 0 || sums.length === 0) return '–';
  return sums.reduce((sum, value) => sum + value, 0).toFixed(1);
}

function columnsOf(collaboration: string, list: SurveyList): DataColumn<SurveyView>[] {
  const most = Math.max(1e-9, ...list.surveys.map((survey) => survey.summedCompleteness ?? 0));
  // The counts of stars and entries leave out archived surveys.
  const counted = list.surveys.filter(({ isArchived }) => !isArchived);
  const ready = counted.reduce((sum, survey) => sum + survey.maps.ready, 0);
  const shared = list.overlaps.reduce(
    (sum, set) => sum + (set.surveys.length > 1 ? set.stars : 0),
    0,
  );
  return [
    {
      id: 'survey',
      head: 'survey',
      name: 'survey',
      isRowHead: true,
      value: ({ name }) => name,
      cell: (survey) => <SurveyName collaboration={collaboration} survey={survey} />,
      total: 'Every star once',
    },
    { id: 'band', head: 'band', name: 'band', className: wide, value: ({ band }) => band },
    {
      id: 'observed',
      head: 'observed',
      name: 'first year',
      className: `whitespace-nowrap ${wider}`,
      value: ({ observedFrom, observedTo }) => observedFrom ?? observedTo,
      cell: observedYears,
      also: [{ name: 'last year', value: ({ observedTo }) => observedTo }],
    },
    {
      id: 'lead',
      head: 'lead',
      name: 'lead',
      className: `whitespace-nowrap ${wider}`,
      value: ({ lead }) => lead?.name ?? null,
    },
    {
      id: 'targets',
      head: 'targets',
      name: 'targets',
      isNumeric: true,
      value: ({ targets }) => targets,
      total: list.stars,
    },
    {
      id: 'also',
      head: 'also in another',
      name: 'also in another survey',
      isNumeric: true,
      className: wide,
      value: ({ alsoInAnother }) => alsoInAnother,
      total: shared,
    },
    {
      id: 'maps',
      head: (
        <>
          maps<span className={wide}> ready</span>
        </>
      ),
      name: 'maps ready',
      value: ({ maps }) => maps.ready,
      cell: (survey) => <MapsState survey={survey} />,
      total: `${ready} of ${list.entries}`,
    },
    {
      id: 'sum',
      head: (
        <>
          sum<span className={wide}> of probabilities</span>
          <YardstickLines yardstick={list.surveys[0]?.yardstick} />
        </>
      ),
      name: 'sum of detection probabilities',
      isNumeric: true,
      value: ({ summedCompleteness }) => summedCompleteness,
      cell: (survey) => <SummedBar survey={survey} most={most} />,
      total: summedOnce(counted, shared),
    },
    {
      id: 'depth',
      head: '1–1000 AU',
      name: 'depth of search',
      isUnsorted: true,
      isUnwritten: true,
      className: wider,
      value: () => null,
      cell: ({ name, depth }) =>
        depth && (
          <Sparkline
            xs={Float64Array.from(depth.semiMajorAxisAu)}
            ys={Float64Array.from(depth.stars)}
            isLogX
            label={`Depth of search of ${name} from ${depth.semiMajorAxisAu[0]} to ${depth.semiMajorAxisAu.at(-1)} AU`}
          />
        ),
    },
  ];
}

/** Beside other things there is no room for these. */
const ownPageOnly = new Set(['observed', 'lead']);

interface SurveyTableProps {
  collaboration: string;
  list: SurveyList;
  /** The page is about the surveys: its address holds the order, and there is a file. */
  isWholePage?: boolean;
}

/** Surveys with their sensitivity, and the total in which every star counts once. */
export function SurveyTable({ collaboration, list, isWholePage = false }: SurveyTableProps) {
  const columns = useMemo(() => {
    const all = columnsOf(collaboration, list);
    return isWholePage ? all : all.filter(({ id }) => !ownPageOnly.has(id));
  }, [collaboration, list, isWholePage]);
  return (
    <DataTable
      caption="Surveys of the collaboration"
      rows={list.surveys}
      columns={columns}
      rowId={({ id }) => id}
      noun={{ one: 'survey', many: 'surveys' }}
      fileName={isWholePage ? `${collaboration}-surveys` : undefined}
      isInAddress={isWholePage}
      hasTotal
    />
  );
}
