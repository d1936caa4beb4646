'use client';

import dynamic from 'next/dynamic';
import { useCallback, useMemo, useRef, useState } from 'react';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { useAnalysis } from '@/components/hooks/use-analyses';
import { usePopulations } from '@/components/hooks/use-populations';
import { useRun } from '@/components/hooks/use-runs';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { PageTitle } from '@/components/ui/page-title';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PackedRun } from '@/lib/schemas/packed-run';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedPopulation, PowerLawDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import { AnalysisState } from './analysis-state';
import { isSameSetting, type LiveSetting, settingOfRecipe, settingToQuery } from './live-setting';
import { ResultActions } from './result-actions';
import { ResultBody } from './result-body';
import { RunNotices } from './run-notices';
import { recipeOfRun } from './run-recipe';
import { isFinished, isOnItsWay } from './run-standing';
import { isAsRun } from './under';
import { type RunSource, useRunSource } from './use-run-source';

/** Each analysis shows one of these, and a run on its way only some. */
const NoRunPlate = dynamic(async () => (await import('./no-run-plate')).NoRunPlate);
const StoredResult = dynamic(async () => (await import('./stored-result')).StoredResult);

interface ResultScreenProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run, with its result. */
  run: PackedRun | null;
  /** The population that this run used. */
  runPopulation: ListedPopulation | null;
  /** What the address asks for; undefined where the population has no live controls. */
  asked: LiveSetting | undefined;
  /** The run's answer about ages and cooling, where it has one. */
  agesCooling: AgesCoolingAnswer | null;
}

/** An analysis: its newest result, and where its laws allow it, live under the controls. */
export function ResultScreen(props: ResultScreenProps) {
  const { collaboration, runPopulation } = props;
  const { data: analysis = props.analysis, mutate } = useAnalysis(
    collaboration,
    props.analysis.key,
    props.analysis,
  );
  const finished = analysis.runs.find(isFinished);
  const first = useUnpackedRun(props.run);
  const { data: run = first } = useRun(collaboration, finished?.id, first ?? undefined);
  const inRun = useRunDefinition(collaboration, analysis, run, runPopulation);
  const onChanged = useCallback(() => {
    void mutate();
  }, [mutate]);
  const { definition: planned } = analysis.population;
  const isLive =
    isPlainPowerLaw(planned) &&
    (runPopulation === null || isPlainPowerLaw(runPopulation.definition));
  const shown = isLive && run && inRun ? shownRun(run, inRun) : undefined;
  const known = run?.id === props.run?.id ? props.agesCooling : null;
  const source = useRunSource(collaboration, shown?.run, known);
  if (!isLive) {
    return (
      <StoredResult
        collaboration={collaboration}
        analysis={analysis}
        run={run}
        definition={runPopulation?.definition ?? planned}
        onChanged={onChanged}
      />
    );
  }
  return (
    <LiveResult
      {...{ collaboration, analysis, planned, onChanged, source, shown }}
      asked={props.asked}
    />
  );
}

interface LiveResultProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Of the recipe. */
  planned: PowerLawDefinition;
  asked: LiveSetting | undefined;
  onChanged(): void;
  /** Undefined until there is a finished run. */
  shown?: ShownRun;
  /** What its controls follow. */
  source: RunSource;
}

interface ShownRun {
  run: DrawnRun;
  inputs: DrawnInputs;
  result: DrawnResult;
  definition: PowerLawDefinition;
}

function shownRun(run: DrawnRun, definition: PowerLawDefinition): ShownRun | undefined {
  const { inputs, result } = run;
  return inputs && result ? { run, inputs, result, definition } : undefined;
}

/** The result under controls that it follows at once, and what becomes of a change. */
function LiveResult(props: LiveResultProps) {
  const { collaboration, analysis, asked, planned, onChanged, shown, source } = props;
  const finished = analysis.runs.find(isFinished);
  const newest = analysis.runs[0];
  const run = shown?.run ?? null;
  const definition = shown?.definition;

  const inRecipe = useMemo(
    () => settingOfRecipe(analysis.recipe, planned),
    [analysis.recipe, planned],
  );
  const [moved, setMoved] = useState<LiveSetting | undefined>(() =>
    asked && isSameSetting(asked, inRecipe) ? undefined : asked,
  );
  const setting = moved ?? inRecipe;
  const isUnsaved = moved !== undefined && !isSameSetting(moved, inRecipe);
  useAddressQuery(settingToQuery(setting, inRecipe));

  const latest = useRef(setting);
  latest.current = setting;
  const isWhatIf = !isAsRun(setting);
  const inRun = useMemo(
    () => (run && definition && settingOfRun(run, definition)) ?? inRecipe,
    [run, definition, inRecipe],
  );
  const actions = useMemo(() => {
    const make = (placement: 'head' | 'foot') => (
      <ResultActions
        placement={placement}
        collaboration={collaboration}
        analysis={analysis}
        run={finished}
        settingNow={() => latest.current}
        isWhatIf={isWhatIf}
        isUnsaved={isUnsaved}
        isBusy={isOnItsWay(newest)}
        onUndo={() => setMoved(undefined)}
        onSaved={() => {
          setMoved(undefined);
          onChanged();
        }}
      />
    );
    return { head: make('head'), foot: make('foot') };
  }, [collaboration, analysis, finished, newest, isWhatIf, isUnsaved, onChanged]);
  // The same elements while a hand moves a control: nothing of them is drawn anew.
  const head = useMemo(
    () => (
      <>
        <PageTitle
          title={analysis.name}
          crumbs={[
            { href: `/${collaboration}/analyses`, label: 'Analyses' },
            { label: analysis.key },
          ]}
          state={
            <AnalysisState run={finished} {...{ collaboration, analysis, isUnsaved, onChanged }} />
          }
          actions={actions.head}
        />
        <RunNotices
          collaboration={collaboration}
          analysis={analysis}
          run={finished}
          needsRun={!needsOnlyLive(analysis, run)}
          onChanged={onChanged}
        />
      </>
    ),
    [collaboration, analysis, finished, run, isUnsaved, actions, onChanged],
  );

  return (
    <>
      {head}
      {shown ? (
        <ResultBody
          key={shown.run.id}
          collaboration={collaboration}
          run={shown.run}
          inputs={shown.inputs}
          result={shown.result}
          inRun={inRun}
          setting={setting}
          isUnsaved={isUnsaved}
          source={source}
          canAsk={analysis.can.run}
          footActions={actions.foot}
          onSetting={setMoved}
        />
      ) : (
        <NoRunPlate
          collaboration={collaboration}
          analysis={analysis}
          isOnItsWay={isOnItsWay(newest)}
          onChanged={onChanged}
        />
      )}
    </>
  );
}

/** The population of the shown run: not always the one that the recipe names by now. */
function useRunDefinition(
  collaboration: string,
  analysis: AnalysisView,
  run: DrawnRun | null,
  known: ListedPopulation | null,
) {
  const wanted = run?.inputs?.population.id;
  const atHand = [analysis.population, known].find((population) => population?.id === wanted);
  const { data: all } = usePopulations(
    collaboration,
    atHand === undefined || atHand === null ? undefined : [atHand],
  );
  const found = (atHand ?? all?.find((population) => population.id === wanted))?.definition;
  return found && isPlainPowerLaw(found) ? found : undefined;
}

function settingOfRun(run: DrawnRun, definition: PowerLawDefinition): LiveSetting | undefined {
  const recipe = recipeOfRun(run);
  return recipe && settingOfRecipe(recipe, definition);
}

/** Whether the recipe differs from the run in nothing that needs new maps. */
function needsOnlyLive(analysis: AnalysisView, run: DrawnRun | null): boolean {
  const recipe = recipeOfRun(run);
  if (!recipe) return false;
  return (
    recipe.combination === analysis.recipe.combination &&
    [...recipe.surveyIds].sort().join() === [...analysis.recipe.surveyIds].sort().join()
  );
}
