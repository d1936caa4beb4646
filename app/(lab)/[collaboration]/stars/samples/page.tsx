import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { EMPTY_DRAFT, readDraft } from '@/components/samples/sample-draft';
import { SamplesScreen } from '@/components/samples/samples-screen';
import { sampleDefinitionSchema } from '@/lib/schemas/samples';
import { previewSample } from '@/lib/services/sample-preview';
import { listSamples } from '@/lib/services/samples';
import { listStars } from '@/lib/services/stars';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Samples' };

export default async function SamplesPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { definition } = readDraft(EMPTY_DRAFT, sampleDefinitionSchema);
  const [{ surveys }, { samples }, { counts }, preview] = await Promise.all([
    listSurveys(actor),
    listSamples(actor),
    listStars(actor, { limit: 1, offset: 0 }),
    definition && previewSample(actor, { definition }),
  ]);
  return (
    <SamplesScreen
      collaboration={actor.collaboration}
      surveys={surveys.filter(({ isArchived }) => !isArchived)}
      initial={samples}
      counts={counts}
      firstPreview={preview}
    />
  );
}
