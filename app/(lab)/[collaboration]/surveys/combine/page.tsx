import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { CombineScreen } from '@/components/combinations/combine-screen';
import { may } from '@/lib/access/permissions';
import { listCombinations } from '@/lib/services/combinations';
import { newRecipeDefaults } from '@/lib/services/settings';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Combine surveys' };

export default async function CombinePage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [{ surveys }, { combinations }, usual] = await Promise.all([
    listSurveys(actor),
    listCombinations(actor),
    newRecipeDefaults(actor.collaborationId),
  ]);
  return (
    <CombineScreen
      collaboration={actor.collaboration}
      surveys={surveys.filter(({ isArchived }) => !isArchived)}
      initial={combinations}
      usualRule={usual.combination}
      canCombine={may(actor, 'combine')}
    />
  );
}
