'use client';

import { useRef, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAnalyses } from '@/components/hooks/use-analyses';
import { fetchRun } from '@/components/hooks/use-runs';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { describeLevel, type Likelihood, type RatePrior } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { listNames } from './name-words';
import { NO_TABLE, priorOfRun, quantityFor } from './prior-of-run';

interface RunPriorChoiceProps {
  collaboration: string;
  likelihood: Likelihood;
  prior: RatePrior;
  /** Ids of the surveys of this analysis: a star must not speak twice. */
  surveyIds: string[];
  onChange(prior: RatePrior): void;
}

/** An earlier run whose posterior becomes the prior. */
export function RunPriorChoice(props: RunPriorChoiceProps) {
  const { collaboration, likelihood, prior, surveyIds, onChange } = props;
  const { data: analyses, error } = useAnalyses(collaboration);
  const [chosen, setChosen] = useState('');
  const [problem, setProblem] = useState<string>();
  const newest = useRef('');
  const runs = finishedRuns(analyses ?? []);
  const isFilled = prior.law === 'tabulated' && prior.value.length > 0;
  const wanted = quantityFor(likelihood);
  const shared = sharedSurveys(runs.find(({ run }) => run.id === chosen)?.analysis, surveyIds);

  const choose = async (id: string) => {
    newest.current = id;
    setChosen(id);
    setProblem(undefined);
    onChange(NO_TABLE);
    if (id === '') return;
    try {
      const made = priorOfRun(await fetchRun(collaboration, id), likelihood);
      if (newest.current === id) onChange(made);
    } catch (reason) {
      if (newest.current !== id) return;
      setProblem(reason instanceof RangeError ? `${reason.message}.` : sentenceOf(reason));
    }
  };

  return (
    <div className="grid max-w-[40rem] gap-2">
      <SelectField
        label="Run whose posterior is the prior"
        hint="Its curve, straight between its points; at most 0.1 % of its probability lies above the last."
        value={chosen}
        onChange={(event) => choose(event.target.value)}
        options={[
          { value: '', label: runs.length === 0 ? 'no finished run' : 'choose a run' },
          ...runs.map(({ analysis, run }) => ({
            value: run.id,
            label: runLabel(analysis, run, wanted),
            isDisabled: run.quantity !== wanted,
          })),
        ]}
      />
      {error !== undefined && (
        <p className="text-bad text-note">The runs could not be fetched: {sentenceOf(error)}</p>
      )}
      {problem !== undefined && (
        <Notice tone="bad" title="It cannot be the prior." isAnnounced>
          {problem}
        </Notice>
      )}
      {isFilled && (
        <p className="text-ink3 text-note" role="status">
          Prior: posterior of {prior.source}, {prior.value.length} points.
        </p>
      )}
      {isFilled && shared.length > 0 && (
        <Notice tone="warn" title="The same stars would speak twice.">
          That run and this analysis share {listNames(shared)}: a posterior is the prior of other
          data alone.
        </Notice>
      )}
    </div>
  );
}

function finishedRuns(analyses: AnalysisView[]) {
  return analyses.flatMap((analysis) =>
    analysis.runs
      .filter((run) => run.job.status === 'done' && run.limit !== null)
      .map((run) => ({ analysis, run })),
  );
}

type FinishedRun = ReturnType<typeof finishedRuns>[number];

function runLabel(
  { key, name }: AnalysisView,
  { number, limit, quantity, credibleLevel }: FinishedRun['run'],
  wanted: string,
): string {
  const answer =
    limit === null || quantity === null
      ? ''
      : `, ${formatLimit(limit, quantity)} (${describeLevel(credibleLevel)})`;
  const other = quantity === wanted ? '' : ', answers for another quantity';
  return `${key} run ${number}: ${name}${answer}${other}`;
}

function sharedSurveys(analysis: AnalysisView | undefined, surveyIds: string[]): string[] {
  return (analysis?.surveys ?? [])
    .filter(({ id }) => surveyIds.includes(id))
    .map(({ name }) => name);
}
