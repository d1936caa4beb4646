import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { widestRun } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { NewAnalysis } from '@/components/analyses/new-analysis';
import { KnownAnswers } from '@/components/hooks/known-answers';
import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { getAnalysis } from '@/lib/services/analyses';
import { listCombinations } from '@/lib/services/combinations';
import { listPopulations } from '@/lib/services/populations';
import { listSamples } from '@/lib/services/samples';
import { newRecipeDefaults } from '@/lib/services/settings';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'New analysis' };

/** The draft that the address asks to change. */
async function findDraft(actor: Actor, key: string | undefined) {
  if (key === undefined) return undefined;
  try {
    const draft = await getAnalysis(actor, key);
    if (draft.can.change) return draft;
  } catch (reason) {
    if (!(reason instanceof NotFound)) throw reason;
  }
  return notFound();
}

export default async function NewAnalysisPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [surveys, { populations }, run, { combinations }, { samples }, usual, wanted] =
    await Promise.all([
      listSurveys(actor),
      listPopulations(actor),
      widestRun(actor),
      listCombinations(actor),
      listSamples(actor),
      newRecipeDefaults(actor.collaborationId),
      searchParams,
    ]);
  const draft = await findDraft(actor, wanted.draft);
  const combination = draft ? draft.recipe.combinationId : wanted.combination;
  return (
    <KnownAnswers collaboration={actor.collaboration} answers={{ samples }}>
      <NewAnalysis
        collaboration={actor.collaboration}
        surveys={surveys}
        populations={populations}
        previewRun={run}
        usual={usual}
        wanted={wanted.population}
        stored={combinations.find(({ id }) => id === combination)}
        draft={draft}
      />
    </KnownAnswers>
  );
}
