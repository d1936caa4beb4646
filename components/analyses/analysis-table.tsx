'use client';

import { useMemo } from 'react';
import { IntervalAxis, IntervalMark, intervalMax } from '@/components/charts/intervals-on-axis';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { formatDuration } from '@/components/runs/time-words';
import type { DataColumn, Facet } from '@/components/ui/data-table/column';
import { DataTable } from '@/components/ui/data-table/data-table';
import { Link } from '@/components/ui/link';
import { JupiterMass } from '@/components/ui/notation';
import { type StateKind, StateMark } from '@/components/ui/state-mark';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatRange, rateUnit } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import { lawNames } from './prior-choice';

export function newestFinished(analysis: AnalysisView): RunSummary | undefined {
  return analysis.runs.find((run) => run.job.status === 'done' && run.limit !== null);
}

function columnsOf(collaboration: string, max: number): DataColumn<AnalysisView>[] {
  return [
    {
      id: 'key',
      head: 'key',
      name: 'key',
      className: 'whitespace-nowrap text-ink3 max-md:hidden',
      value: ({ key }) => key,
    },
    {
      id: 'analysis',
      head: 'analysis',
      name: 'analysis',
      isRowHead: true,
      value: ({ name }) => name,
      cell: (analysis) => {
        const { key, name, population } = analysis;
        return (
          <>
            <Link
              href={`/${collaboration}/analyses/${key}`}
              className="text-ink max-md:inline-block max-md:py-2"
            >
              {name}
            </Link>
            <span className="block font-normal text-chart text-ink3 md:hidden">
              {key}, <MassRange definition={population.definition} />,{' '}
              <AxisRange definition={population.definition} />
            </span>
            <span className="block font-normal md:hidden">
              <StateOf analysis={analysis} />
            </span>
          </>
        );
      },
    },
    {
      id: 'ranges',
      head: (
        <>
          <JupiterMass /> · AU
        </>
      ),
      name: 'ranges, Jupiter masses · AU',
      className: 'whitespace-nowrap max-md:hidden',
      isUnsorted: true,
      value: ({ population }) => rangeWords(population.definition),
    },
    {
      id: 'stars',
      head: 'stars',
      name: 'stars',
      isNumeric: true,
      className: 'max-md:hidden',
      value: (analysis) => newestFinished(analysis)?.stars ?? null,
    },
    {
      id: 'detections',
      head: 'det.',
      name: 'detections',
      isNumeric: true,
      className: 'max-md:hidden',
      value: (analysis) => newestFinished(analysis)?.detections ?? null,
    },
    {
      id: 'interval',
      head: (
        <>
          <span className="sr-only">interval</span>
          <IntervalAxis max={max} />
        </>
      ),
      name: 'interval',
      className: 'max-lg:hidden',
      isUnsorted: true,
      isUnwritten: true,
      value: () => null,
      cell: (analysis) => <RunMark run={newestFinished(analysis)} analysis={analysis} max={max} />,
    },
    {
      id: 'limit',
      head: 'limit',
      name: 'upper limit',
      isNumeric: true,
      value: (analysis) => newestFinished(analysis)?.limit ?? null,
      also: [
        {
          name: 'quantity',
          value: (analysis) => newestFinished(analysis)?.quantity ?? null,
        },
        {
          name: 'credible level',
          value: (analysis) => newestFinished(analysis)?.credibleLevel ?? null,
        },
        {
          name: 'conditions',
          value: (analysis) => {
            const run = newestFinished(analysis);
            return run ? limitNote(analysis, run) : null;
          },
        },
      ],
      cell: (analysis) => <LimitOf analysis={analysis} />,
    },
    {
      id: 'state',
      head: 'state',
      name: 'state',
      className: 'whitespace-nowrap max-md:hidden',
      value: (analysis) => stateOf(analysis, newestFinished(analysis)).words,
      cell: (analysis) => <StateOf analysis={analysis} />,
    },
  ];
}

function StateOf({ analysis }: { analysis: AnalysisView }) {
  const { kind, words } = stateOf(analysis, newestFinished(analysis));
  return <StateMark kind={kind}>{words}</StateMark>;
}

function LimitOf({ analysis }: { analysis: AnalysisView }) {
  const run = newestFinished(analysis);
  if (run?.limit == null || !run.quantity) return '–';
  return (
    <>
      <span className="limit">{formatLimit(run.limit, run.quantity)}</span>
      <span className="block text-chart text-ink3">{limitNote(analysis, run)}</span>
    </>
  );
}

interface AnalysisTableProps {
  collaboration: string;
  analyses: AnalysisView[];
  picked?: string[];
  /** Given, analyses can be ticked for comparison, and words and states narrow the list. */
  onPick?(keys: string[]): void;
}

const states: Facet<AnalysisView> = {
  id: 'state',
  label: 'State',
  any: 'any state',
  options: [
    'Running',
    'Failed',
    'Older inputs',
    'Changed',
    'Released',
    'Frozen',
    'Draft',
    'No run yet',
  ].map((words) => ({
    value: words,
    label: words.toLowerCase(),
  })),
  keeps: (analysis, value) => stateOf(analysis, newestFinished(analysis)).words === value,
};

/** Analyses with their intervals on one axis. */
export function AnalysisTable({
  collaboration,
  analyses,
  picked = [],
  onPick,
}: AnalysisTableProps) {
  const limits = analyses.flatMap((analysis) => newestFinished(analysis)?.limit ?? []);
  const max = limits.length > 0 ? intervalMax(limits) : 1;
  const columns = useMemo(() => columnsOf(collaboration, max), [collaboration, max]);
  const isWholePage = onPick !== undefined;
  return (
    <DataTable
      caption="Analyses with the upper limit of their newest run"
      rows={analyses}
      columns={columns}
      rowId={({ key }) => key}
      noun={{ one: 'analysis', many: 'analyses' }}
      searchLabel={isWholePage ? 'Name or key' : undefined}
      textOf={({ key, name }) => `${key} ${name}`}
      facets={isWholePage ? [states] : undefined}
      fileName={isWholePage ? `${collaboration}-analyses` : undefined}
      isInAddress={isWholePage}
      selection={
        onPick && {
          ids: new Set(picked),
          onChange: (keys) => onPick([...keys]),
          label: ({ key }) => `Compare ${key}`,
          canSelect: (analysis) => newestFinished(analysis) !== undefined,
        }
      }
    />
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
    <>
      <IntervalMark
        limit={run.limit}
        interval68={run.interval68 ?? undefined}
        median={run.median ?? undefined}
        isZero={run.detections === 0}
        max={max}
        label={label}
      />
      {run.quantity === 'companions_per_star' && (
        <span className="block text-chart text-ink3">
          here not %, but {rateUnit('companions_per_star')}
        </span>
      )}
    </>
  );
}

function stateOf(
  analysis: AnalysisView,
  run: RunSummary | undefined,
): { kind: StateKind; words: string } {
  if (analysis.state === 'running') return { kind: 'running', words: 'Running' };
  if (analysis.state === 'failed') return { kind: 'bad', words: 'Failed' };
  if (run?.hasOlderInputs) return { kind: 'warn', words: 'Older inputs' };
  if (analysis.state === 'changed') return { kind: 'unsaved', words: 'Changed' };
  if (run?.frozen === 'released') return { kind: 'released', words: 'Released' };
  if (run?.frozen === 'frozen') return { kind: 'frozen', words: 'Frozen' };
  return { kind: 'draft', words: run ? 'Draft' : 'No run yet' };
}
