'use client';

import { usePopulations } from '@/components/hooks/use-populations';
import { useRun } from '@/components/hooks/use-runs';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { DrawnRun } from '@/lib/schemas/runs';
import type { StudyView } from '@/lib/schemas/studies';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf, StudyKind } from '@/lib/schemas/study-settings';
import type { AnswerProps, AskedRun } from './kind-entry';

interface RunAndPopulation {
  collaboration: string;
  analysis: AnalysisView;
  run: DrawnRun;
  definition: ListedPopulation | null;
}

/** A run with what questions of it need, or undefined while it has no result. */
export function askedRun(given: RunAndPopulation): AskedRun | undefined {
  const { collaboration, analysis, run, definition } = given;
  const { inputs, result } = run;
  if (!inputs || !result) return undefined;
  return {
    collaboration,
    analysis,
    run,
    inputs,
    result,
    definition: definition?.definition ?? null,
    quantity: result.quantity,
    credibleLevel: result.credibleLevel,
  };
}

interface AnsweredRunOptions {
  collaboration: string;
  analysis: AnalysisView;
  /** The newest finished run and its population, which are at hand. */
  run: DrawnRun | null;
  runPopulation: ListedPopulation | null;
  study: StudyView | undefined;
}

/** The run from which an answer was computed: an earlier one is fetched. */
export function useAnsweredRun(options: AnsweredRunOptions): AskedRun | undefined {
  const { collaboration, analysis, run: newest, runPopulation, study } = options;
  const { data: run } = useRun(collaboration, study?.run.id, newest ?? undefined);
  const wanted = run?.inputs?.population.id;
  const atHand = [runPopulation, analysis.population].find((one) => one?.id === wanted);
  const { data: populations } = usePopulations(collaboration, atHand ? [atHand] : undefined);
  if (!run) return undefined;
  const population = atHand ?? populations?.find(({ id }) => id === wanted) ?? null;
  return askedRun({ collaboration, analysis, run, definition: population });
}

/** An answer of the kind that the page is for, or undefined while there is none. */
export function answerOf<Kind extends StudyKind>(
  kind: Kind,
  study: StudyView,
  asked: AskedRun,
): AnswerProps<Kind> | undefined {
  const { settings, result } = study;
  if (settings.kind !== kind || result?.kind !== kind) return undefined;
  return { asked, study, settings: settings as SettingsOf<Kind>, result: result as ResultOf<Kind> };
}
