'use client';

import { useMemo } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useLoaded } from '@/components/hooks/use-loaded';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { countOf } from '@/components/runs/level-table';
import type { LiveSetting } from '@/components/runs/live-setting';
import { FactsStrip } from '@/components/ui/facts-strip';
import { SectionOpener } from '@/components/ui/section-opener';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { DrawnRun } from '@/lib/schemas/runs';
import type { SurveyView } from '@/lib/schemas/surveys';
import type { Estimated } from './estimated';
import { listNames } from './name-words';

interface EstimateProps {
  collaboration: string;
  /** The finished run of the collaboration with the most stars. */
  run: DrawnRun | null;
  surveys: SurveyView[];
  /** Stars of these surveys, each once. */
  chosenStars: number;
  setting?: LiveSetting;
  /** Known before the choices were checked: what the estimate will be of. */
  expected?: Pick<LiveSetting, 'definition' | 'credibleLevel'>;
  /** The population has a law that only a run can answer. */
  needsRun?: boolean;
}

/** What the choices would give, from maps that a run has used already. */
export function Estimate(props: EstimateProps) {
  const { collaboration, run, surveys, chosenStars, setting, expected, needsRun = false } = props;
  const { data: maps, error, isLoading } = useRunMaps(collaboration, run ?? undefined);
  const inputs = run?.inputs ?? undefined;
  const ids = surveys.map((survey) => survey.id).join();
  const engine = useLoaded('estimate', () => import('./estimated'));
  const { answer: estimate = null, refusal } = useMemo(
    (): Estimated =>
      maps && inputs && setting && engine
        ? engine.estimateOf(inputs, maps, ids.split(','), setting)
        : {},
    [maps, inputs, setting, ids, engine],
  );
  const known = setting ?? expected;
  const isPending = error === undefined && (isLoading || engine === undefined || known !== setting);
  const missing = surveys.filter(
    (survey) => !inputs?.surveys.some((known) => known.id === survey.id),
  );

  const withoutMap = estimate ? chosenStars - estimate.stars : 0;
  const left = leftOutWords(inputs, surveys);

  const about = (definition: PowerLawDefinition) => (
    <p className="text-ink2 text-note">
      About this, for planets of <MassRange definition={definition} /> at{' '}
      <AxisRange definition={definition} />. From the maps of {run?.analysis.key}, run {run?.number}
      {run?.result && ` (${run.result.stars} stars)`}
      {missing.length > 0 &&
        `; ${listNames(missing.map((survey) => survey.name))} did not take part in it`}
      {withoutMap > 0 &&
        `; ${withoutMap} of the ${chosenStars} chosen stars have no map in it${left}`}
      . The run itself may differ where maps are newer.
    </p>
  );

  return (
    <section>
      <SectionOpener title="Estimate" context="before the first run" />
      {estimate && setting && estimate.posterior.constrained ? (
        <>
          <EstimateFacts
            credibleLevel={setting.credibleLevel}
            detections={countOf(estimate.counted.length)}
            limit={formatLimit(estimate.limit, estimate.posterior.quantity)}
            exposure={formatSignificant(estimate.exposure, 3)}
            stars={estimate.stars}
          />
          {about(setting.definition)}
        </>
      ) : isPending && known && run && !needsRun && surveys.length > 0 ? (
        <>
          <p className="sr-only" aria-live="polite">
            Fetching the maps of {run.analysis.key}, run {run.number}.
          </p>
          <EstimateFacts credibleLevel={known.credibleLevel} />
          {about(known.definition)}
        </>
      ) : (
        <p className="text-ink2 text-note" aria-live="polite">
          {estimateWords({
            needsRun,
            refusal,
            hasRun: run !== null,
            isLoading: isPending,
            error: error === undefined ? undefined : sentenceOf(error),
            isUnconstrained: estimate !== null,
            hasSurveys: surveys.length > 0,
          })}
        </p>
      )}
    </section>
  );
}

/** Why a run left out entries of some surveys: " (left out: no curve and no map)". */
function leftOutWords(inputs: DrawnRun['inputs'] | undefined, surveys: SurveyView[]): string {
  const names = new Set(surveys.map(({ name }) => name));
  const own = inputs?.leftOut.filter(({ survey }) => names.has(survey)) ?? [];
  const reasons = [...new Set(own.map(({ reason }) => reason))];
  return reasons.length === 0 ? '' : ` (left out: ${reasons.join('; ')})`;
}

interface EstimateFactsProps {
  credibleLevel: number;
  /** The rest is left out while it is being computed: its place is kept. */
  detections?: string;
  limit?: string;
  exposure?: string;
  stars?: number;
}

function EstimateFacts({ credibleLevel, detections, limit, exposure, stars }: EstimateFactsProps) {
  return (
    <FactsStrip
      facts={[
        {
          name: `${describeLevel(credibleLevel)}, ${detections ?? 'being computed'}`,
          value: limit ?? '\u2026',
          isBound: true,
        },
        {
          name: 'sum of detection probabilities',
          help: 'exposure',
          value: exposure ?? '\u2026',
          note: stars === undefined ? undefined : `of ${stars}`,
        },
      ]}
    />
  );
}

function estimateWords(state: {
  needsRun: boolean;
  refusal: string | undefined;
  hasRun: boolean;
  isLoading: boolean;
  error: string | undefined;
  isUnconstrained: boolean;
  hasSurveys: boolean;
}): string {
  if (state.needsRun) {
    return 'An estimate before the run knows plain power laws and whole surveys only; the run itself answers for this choice.';
  }
  if (!state.hasRun) {
    return 'No run has finished in this collaboration yet, so there are no maps at hand to estimate from. The first run computes the limit itself.';
  }
  if (state.error !== undefined) return `No estimate: ${state.error}`;
  if (state.isLoading) return 'Fetching the maps of an earlier run.';
  if (state.refusal !== undefined) return `No estimate: ${state.refusal}.`;
  if (!state.hasSurveys) return 'Choose a survey to see what it would give.';
  if (state.isUnconstrained) return 'The stored maps see nothing of this population.';
  return 'The maps of the run with the most stars give no limit for these choices: they do not cover these stars or this population.';
}
