import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { CombineScreen } from '@/components/combinations/combine-screen';
import { may } from '@/lib/access/permissions';
import {
  type CombinationDefinition,
  combinationDefinitionSchema,
} from '@/lib/schemas/combinations';
import { previewCombination } from '@/lib/services/combination-preview';
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
  const counted = surveys.filter(({ isArchived }) => !isArchived);
  const definition: CombinationDefinition = {
    surveyIds: counted.map(({ id }) => id),
    rule: usual.combination,
    starRules: [],
    grid: { choice: 'common' },
  };
  const preview = combinationDefinitionSchema.safeParse(definition).success
    ? await previewCombination(actor, { definition })
    : undefined;
  return (
    <CombineScreen
      collaboration={actor.collaboration}
      surveys={counted}
      initial={combinations}
      first={{ definition, preview }}
      canCombine={may(actor, 'combine')}
    />
  );
}
