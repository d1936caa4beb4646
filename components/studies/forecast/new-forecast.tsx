'use client';

import dynamic from 'next/dynamic';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import { usePopulations } from '@/components/hooks/use-populations';
import { useRun } from '@/components/hooks/use-runs';
import { askStudy } from '@/components/hooks/use-studies';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { isFinished } from '@/components/runs/run-standing';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SelectField } from '@/components/ui/select-field';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { SettingsOf } from '@/lib/schemas/study-settings';
import { askedRun } from '../answered-run';

const ForecastForm = dynamic(async () => (await import('./forecast-form')).ForecastForm, {
  loading: () => (
    <p className="rounded-plate bg-well px-5 py-6 text-ink3 text-note" role="status">
      Opening the settings
    </p>
  ),
});

interface NewForecastProps {
  collaboration: string;
  /** Analyses with a finished run. */
  bases: AnalysisView[];
  /** The one to start from, with its run; null without bases. */
  first: { key: string; run: PackedRun; population: ListedPopulation | null } | null;
  /** An earlier forecast whose settings are taken over. */
  start?: SettingsOf<'forecast'>;
  /** Why this person cannot ask. */
  disabledReason?: string;
}

/** From which run, and what is planned; the answer has a page of its own. */
export function NewForecast(props: NewForecastProps) {
  const { collaboration, bases, first, start, disabledReason } = props;
  const router = useRouter();
  const [key, setKey] = useState(first?.key ?? '');
  const { perform, isBusy, problem, faults } = useAction({ leaves: true });
  const analysis = bases.find((one) => one.key === key);
  const firstRun = useUnpackedRun(first?.run ?? null);
  const { data: run, error } = useRun(
    collaboration,
    analysis?.runs.find(isFinished)?.id,
    firstRun ?? undefined,
  );
  const { data: populations } = usePopulations(
    collaboration,
    first?.population ? [first.population] : undefined,
  );
  const definition = populations?.find(({ id }) => id === run?.inputs?.population.id) ?? null;
  const asked = analysis && run && askedRun({ collaboration, analysis, run, definition });

  const ask = async (settings: SettingsOf<'forecast'>) => {
    if (!run) return;
    await perform(async () => {
      const begun = await askStudy(collaboration, run.id, settings);
      router.push(`/${collaboration}/forecasts/${begun.id}`);
    });
  };

  return (
    <>
      <PageTitle
        title="New forecast"
        crumbs={[{ href: `/${collaboration}/forecasts`, label: 'Forecasts' }]}
        context="What would more stars or deeper images add?"
      />
      {bases.length === 0 ? (
        <EmptyState
          title="No run to start from yet"
          actions={
            <LinkButton variant="primary" href={`/${collaboration}/analyses`}>
              Go to the analyses
            </LinkButton>
          }
        >
          A forecast takes its population, prior and level from a finished run, and its stars from
          that run or from a list. Run an analysis first.
        </EmptyState>
      ) : (
        <div className="grid min-w-0 gap-5 pb-10">
          <div className="w-[28rem] max-md:w-full">
            <SelectField
              label="Starting from"
              value={key}
              onChange={(event) => setKey(event.target.value)}
              options={bases.map((one) => ({
                value: one.key,
                label: `${one.key} ${one.name}, run ${one.runs.find(isFinished)?.number}`,
              }))}
              hint={asked?.result.statement.sentence}
            />
          </div>
          {error !== undefined && (
            <Notice tone="bad" title="The run could not be fetched.">
              {sentenceOf(error)}
            </Notice>
          )}
          {asked ? (
            <ForecastForm
              key={asked.run.id}
              asked={asked}
              start={start}
              isBusy={isBusy}
              disabledReason={disabledReason}
              faults={faults}
              onAsk={ask}
            />
          ) : (
            error === undefined && (
              <p className="rounded-plate bg-well px-5 py-6 text-ink3 text-note" role="status">
                Fetching the run of {key}
              </p>
            )
          )}
          {problem !== undefined && faults.length === 0 && (
            <Notice tone="bad" title="It was not asked." isAnnounced>
              {problem}
            </Notice>
          )}
        </div>
      )}
    </>
  );
}
