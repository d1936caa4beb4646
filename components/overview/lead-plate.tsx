import { HistoryStaircase } from '@/components/charts/history-staircase';
import { HelpMark } from '@/components/help/help-mark';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { Conditions, Plate, StatementNumber } from '@/components/ui/plate';
import { useMoment } from '@/components/ui/time-zone';
import {
  describeLevel,
  describePlanet,
  describePlanets,
  describePrior,
  describeStars,
} from '@/lib/inference';
import { formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { Overview } from '@/lib/schemas/overview';

/** The lead analysis as a sentence, and how its limit has moved. */
export function LeadPlate({
  collaboration,
  overview,
  lead,
}: {
  collaboration: string;
  overview: Overview;
  lead: AnalysisView;
}) {
  const moment = useMoment();
  const run = lead.runs.find((one) => one.limit !== null);
  const { definition } = lead.population;
  if (!run || run.limit === null || run.quantity === null) return null;
  const isFraction = run.quantity === 'host_fraction';
  const level = describeLevel(run.credibleLevel);
  const detections = run.detections ?? 0;
  return (
    <Plate>
      <div className="grid gap-x-12 gap-y-6 lg:grid-cols-[minmax(0,2fr)_minmax(0,3fr)]">
        <div>
          <p className="text-[14px] text-ink3">
            Lead analysis, {lead.key}, run {run.number} of{' '}
            {moment(run.finishedAt ?? run.createdAt, 'day')}
            <HelpMark word="upper-limit" />
          </p>
          <StatementNumber
            value={formatSignificant(100 * run.limit, 2)}
            unit={isFraction ? `${THIN_SPACE}%` : undefined}
          />
          <p className="statement">
            {isFraction && `of ${describeStars(definition)} host `}
            {definition.form === 'systems' ? (
              <b>
                {isFraction ? `one ${describePlanet(definition)}` : describePlanets(definition)}
              </b>
            ) : (
              <>
                {isFraction ? 'at least one planet of' : 'planets of'}{' '}
                <b>
                  <MassRange definition={definition} />
                </b>{' '}
                at{' '}
                <b>
                  <AxisRange definition={definition} />
                </b>
              </>
            )}
            {!isFraction && ` per 100 ${describeStars(definition)}`}
          </p>
          <div className="mt-4">
            <Conditions
              rows={[
                { name: 'Level', help: 'credible-level', value: `${level}, credible` },
                {
                  name: 'Prior',
                  help: 'prior',
                  value: describePrior(lead.recipe.prior, run.quantity),
                },
                {
                  name: 'Sample',
                  help: 'detection',
                  value: `${run.stars} stars, ${detections} vetted ${detections === 1 ? 'detection' : 'detections'}`,
                },
              ]}
            />
          </div>
          <div className="mt-2 -ml-1">
            <RecordedStatementCopy collaboration={collaboration} runId={run.id} />
          </div>
          <p className="mt-2 flex flex-wrap gap-x-7 gap-y-2 text-[14px]">
            <Link
              className="font-semibold text-p-data"
              href={`/${collaboration}/analyses/${lead.key}`}
            >
              <span className="inline-flex items-center gap-1.5">
                Open {lead.key}
                <Icon name="forward" size={14} />
              </span>
            </Link>
            {run.zeroLimit !== null && detections > 0 && (
              <Link
                className="font-semibold text-p-data"
                href={`/${collaboration}/analyses/${lead.key}?detections=none`}
              >
                The same with zero detections
              </Link>
            )}
          </p>
        </div>
        <div className="min-w-0">
          <p className="text-[14px] text-ink3">How the {level} limit has moved</p>
          <HistoryStaircase
            quantity={run.quantity}
            steps={overview.history.map((step) => ({
              at: Date.parse(step.at),
              run: step.run,
              change: step.label,
              limit: step.limit,
              limitWithZero: step.zeroLimit,
            }))}
          />
        </div>
      </div>
    </Plate>
  );
}
