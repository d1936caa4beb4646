import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { SamplesScreen } from '@/components/samples/samples-screen';
import { listSamples } from '@/lib/services/samples';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Samples' };

export default async function SamplesPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [{ surveys }, { samples }] = await Promise.all([listSurveys(actor), listSamples(actor)]);
  return (
    <SamplesScreen
      collaboration={actor.collaboration}
      surveys={surveys.filter(({ isArchived }) => !isArchived)}
      initial={samples}
    />
  );
}
