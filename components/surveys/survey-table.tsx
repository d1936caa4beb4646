import Link from 'next/link';
import { ProbabilityBar } from '@/components/charts/probability-bar';
import { seriesColour } from '@/components/charts/series';
import { Sparkline } from '@/components/charts/sparkline';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { SurveyList, SurveyView } from '@/lib/schemas/surveys';

/** "2015–2019", one year alone, or a dash. */
export function observedYears(survey: Pick<SurveyView, 'observedFrom' | 'observedTo'>): string {
  const { observedFrom: from, observedTo: to } = survey;
  if (from === null && to === null) return '–';
  if (from === null || to === null || from === to) return String(from ?? to);
  return `${from}–${to}`;
}

function MapsState({ survey }: { survey: SurveyView }) {
  const { maps, mapJob } = survey;
  const isOpen = mapJob?.status === 'running' || mapJob?.status === 'waiting';
  const count = `${maps.ready} of ${survey.targets}`;
  if (isOpen) return <StateMark kind="running">{count}</StateMark>;
  if (maps.failed > 0) return <StateMark kind="warn">{count}</StateMark>;
  if (maps.ready === survey.targets && maps.ready > 0)
    return <StateMark kind="ok">{count}</StateMark>;
  return <StateMark kind="waiting">{count}</StateMark>;
}

/** Columns that a narrow screen leaves to the survey's own page. */
const wide = 'max-md:hidden';

function SurveyRow({
  collaboration,
  survey,
  most,
}: {
  collaboration: string;
  survey: SurveyView;
  most: number;
}) {
  return (
    <Row>
      <Cell isRowHead>
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
            <span className="font-normal text-ink3">
              {survey.shared.isWithdrawn ? 'withdrawn by' : 'by'} {survey.shared.owner}
            </span>
          ) : (
            survey.isArchived && <span className="font-normal text-ink3">archived</span>
          )}
        </span>
      </Cell>
      <Cell className={wide}>{survey.band}</Cell>
      <Cell className={`whitespace-nowrap ${wide}`}>{observedYears(survey)}</Cell>
      <Cell className={`whitespace-nowrap ${wide}`}>{survey.lead?.name ?? '–'}</Cell>
      <Cell isNumeric>{survey.targets}</Cell>
      <Cell isNumeric className={wide}>
        {survey.alsoInAnother}
      </Cell>
      <Cell className="whitespace-nowrap">
        <MapsState survey={survey} />
      </Cell>
      <Cell className={wide}>
        {survey.summedCompleteness === null ? (
          '–'
        ) : (
          <ProbabilityBar
            value={survey.summedCompleteness / most}
            colour={seriesColour(survey.position)}
            width={120}
          />
        )}
      </Cell>
      <Cell isNumeric>{survey.summedCompleteness?.toFixed(1) ?? '–'}</Cell>
      <Cell className={wide}>
        {survey.depth && (
          <Sparkline
            xs={Float64Array.from(survey.depth.semiMajorAxisAu)}
            ys={Float64Array.from(survey.depth.stars)}
            isLogX
            label={`Depth of search of ${survey.name} from ${survey.depth.semiMajorAxisAu[0]} to ${survey.depth.semiMajorAxisAu.at(-1)} AU`}
          />
        )}
      </Cell>
    </Row>
  );
}

interface SurveyTableProps {
  collaboration: string;
  list: SurveyList;
}

/** Surveys with their sensitivity, and the total in which every star counts once. */
export function SurveyTable({ collaboration, list }: SurveyTableProps) {
  const most = Math.max(1e-9, ...list.surveys.map((survey) => survey.summedCompleteness ?? 0));
  const ready = list.surveys.reduce((sum, survey) => sum + survey.maps.ready, 0);
  const shared = list.overlaps.reduce(
    (sum, set) => sum + (set.surveys.length > 1 ? set.stars : 0),
    0,
  );
  return (
    <Table caption="Surveys of the collaboration">
      <TableHead>
        <Row>
          <HeadCell>survey</HeadCell>
          <HeadCell className={wide}>band</HeadCell>
          <HeadCell className={wide}>observed</HeadCell>
          <HeadCell className={wide}>lead</HeadCell>
          <HeadCell isNumeric>targets</HeadCell>
          <HeadCell isNumeric className={wide}>
            also in another
          </HeadCell>
          <HeadCell>maps ready</HeadCell>
          <HeadCell colSpan={2} className={wide}>
            sum of detection probabilities
          </HeadCell>
          <HeadCell isNumeric className="md:hidden">
            sum
          </HeadCell>
          <HeadCell className={wide}>1–1000 AU</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {list.surveys.map((survey) => (
          <SurveyRow key={survey.id} collaboration={collaboration} survey={survey} most={most} />
        ))}
        <Row isTotal>
          <Cell isRowHead className="whitespace-nowrap">
            Every star once
          </Cell>
          <Cell className={wide} />
          <Cell className={wide} />
          <Cell className={wide} />
          <Cell isNumeric>{list.stars}</Cell>
          <Cell isNumeric className={wide}>
            {shared}
          </Cell>
          <Cell className="whitespace-nowrap">
            {ready} of {list.entries}
          </Cell>
          <Cell className={wide} />
          <Cell />
          <Cell className={wide} />
        </Row>
      </TableBody>
    </Table>
  );
}
