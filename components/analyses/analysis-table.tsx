'use client';

import Link from 'next/link';
import { IntervalAxis, IntervalMark, intervalMax } from '@/components/charts/intervals-on-axis';
import { formatDuration } from '@/components/runs/time-words';
import { JupiterMass } from '@/components/ui/notation';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatRange } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { lawNames } from './prior-choice';

export function newestFinished(analysis: AnalysisView): RunSummary | undefined {
  return analysis.runs.find((run) => run.job.status === 'done' && run.limit !== null);
}

/** Analyses with their intervals on one axis; with `onPick` two can be ticked for comparison. */
export function AnalysisTable({
  collaboration,
  analyses,
  picked = [],
  onPick,
}: {
  collaboration: string;
  analyses: AnalysisView[];
  picked?: string[];
  onPick?(key: string): void;
}) {
  const limits = analyses.flatMap((analysis) => newestFinished(analysis)?.limit ?? []);
  const max = limits.length > 0 ? intervalMax(limits) : 1;
  return (
    <Table caption="Analyses with the upper limit of their newest run">
      <TableHead>
        <tr>
          {onPick && (
            <HeadCell>
              <span className="sr-only">compare</span>
            </HeadCell>
          )}
          <HeadCell className="max-md:hidden">key</HeadCell>
          <HeadCell>analysis</HeadCell>
          <HeadCell className="max-md:hidden">
            <JupiterMass /> · AU
          </HeadCell>
          <HeadCell isNumeric className="max-md:hidden">
            stars
          </HeadCell>
          <HeadCell isNumeric className="max-md:hidden">
            det.
          </HeadCell>
          <HeadCell className="pb-0 max-lg:hidden">
            <span className="sr-only">interval</span>
            <IntervalAxis max={max} unit="" />
          </HeadCell>
          <HeadCell isNumeric>limit</HeadCell>
          <HeadCell className="max-md:hidden">state</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {analyses.map((analysis) => {
          const run = newestFinished(analysis);
          const { definition } = analysis.population;
          return (
            <Row key={analysis.id} isSelected={picked.includes(analysis.key)}>
              {onPick && (
                <Cell className="w-8">
                  <label className="flex size-6 items-center justify-center max-md:size-11">
                    <input
                      type="checkbox"
                      className="size-[18px] accent-(--ink)"
                      checked={picked.includes(analysis.key)}
                      disabled={!run}
                      onChange={() => onPick(analysis.key)}
                    />
                    <span className="sr-only">Compare {analysis.key}</span>
                  </label>
                </Cell>
              )}
              <Cell className="whitespace-nowrap text-ink3 max-md:hidden">{analysis.key}</Cell>
              <Cell isRowHead>
                <Link
                  href={`/${collaboration}/analyses/${analysis.key}`}
                  className="text-ink max-md:inline-block max-md:py-2"
                >
                  {analysis.name}
                </Link>
                <span className="block font-normal text-chart text-ink3 md:hidden">
                  {analysis.key}, {rangeWords(definition)}
                </span>
              </Cell>
              <Cell className="whitespace-nowrap max-md:hidden">{rangeWords(definition)}</Cell>
              <Cell isNumeric className="max-md:hidden">
                {run?.stars ?? '–'}
              </Cell>
              <Cell isNumeric className="max-md:hidden">
                {run?.detections ?? '–'}
              </Cell>
              <Cell className="max-lg:hidden">
                <RunMark run={run} analysis={analysis} max={max} />
              </Cell>
              <Cell isNumeric>
                {run?.limit != null && run.quantity ? (
                  <>
                    <span className="limit">{formatLimit(run.limit, run.quantity)}</span>
                    <span className="block text-chart text-ink3">{limitNote(analysis, run)}</span>
                  </>
                ) : (
                  '–'
                )}
              </Cell>
              <Cell className="whitespace-nowrap max-md:hidden">
                <StateOf analysis={analysis} run={run} />
              </Cell>
            </Row>
          );
        })}
      </TableBody>
    </Table>
  );
}

/** Level and prior beside the number; the prior of a changed recipe is not that of its run. */
function limitNote(analysis: AnalysisView, run: RunSummary): string {
  const level = describeLevel(run.credibleLevel);
  return analysis.state === 'changed' ? level : `${level}, ${lawNames[analysis.recipe.prior.law]}`;
}

function rangeWords(definition: AnalysisView['population']['definition']): string {
  const mass =
    definition.form === 'mass-ratio'
      ? `q ${formatRange(definition.massRatioMin, definition.massRatioMax, '')}`
      : formatRange(definition.massMinMjup, definition.massMaxMjup, '');
  return `${mass} · ${formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, '')}`;
}

function RunMark({
  run,
  analysis,
  max,
}: {
  run: RunSummary | undefined;
  analysis: AnalysisView;
  max: number;
}) {
  const { job } = analysis.runs[0] ?? {};
  if (analysis.state === 'running' && job) {
    const share = job.total > 0 ? Math.min(1, job.done / job.total) : 0;
    return (
      <span className="block w-[236px]">
        <span className="block h-1.5 bg-act-soft">
          <span className="block h-full bg-data" style={{ width: `${100 * share}%` }} />
        </span>
        <span className="text-chart text-ink3">
          {job.status === 'waiting' ? 'waiting for a worker' : `${job.done} of ${job.total}`}
          {job.timeLeftS !== null && `, about ${formatDuration(job.timeLeftS)} left`}
        </span>
      </span>
    );
  }
  if (run?.limit == null || !run.quantity) return null;
  const label = `limit ${formatLimit(run.limit, run.quantity)} at ${describeLevel(run.credibleLevel)}`;
  return (
    <IntervalMark
      limit={run.limit}
      interval68={run.interval68 ?? undefined}
      median={run.median ?? undefined}
      isZero={run.detections === 0}
      max={max}
      label={label}
    />
  );
}

function StateOf({ analysis, run }: { analysis: AnalysisView; run: RunSummary | undefined }) {
  if (analysis.state === 'running') return <StateMark kind="running">Running</StateMark>;
  if (analysis.state === 'failed') return <StateMark kind="bad">Failed</StateMark>;
  if (run?.hasOlderInputs) return <StateMark kind="warn">Older inputs</StateMark>;
  if (analysis.state === 'changed') return <StateMark kind="unsaved">Changed</StateMark>;
  return <StateMark kind="draft">{run ? 'Draft' : 'No run yet'}</StateMark>;
}
