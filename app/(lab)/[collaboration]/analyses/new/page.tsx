import type { Metadata } from 'next';
import { newestRun } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { NewAnalysis } from '@/components/analyses/new-analysis';
import { listCombinations } from '@/lib/services/combinations';
import { listPopulations } from '@/lib/services/populations';
import { newRecipeDefaults } from '@/lib/services/settings';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'New analysis' };

export default async function NewAnalysisPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [surveys, { populations }, run, { combinations }, usual, wanted] = await Promise.all([
    listSurveys(actor),
    listPopulations(actor),
    newestRun(actor),
    listCombinations(actor),
    newRecipeDefaults(actor.collaborationId),
    searchParams,
  ]);
  return (
    <NewAnalysis
      collaboration={actor.collaboration}
      surveys={surveys}
      populations={populations}
      previewRun={run}
      usual={usual}
      wanted={wanted.population}
      stored={combinations.find(({ id }) => id === wanted.combination)}
    />
  );
}
