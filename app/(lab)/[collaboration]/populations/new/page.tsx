import type { Metadata } from 'next';
import { widestRun } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { askedSetting } from '@/components/populations/asked-setting';
import { PopulationBuilder } from '@/components/populations/population-builder';
import { may } from '@/lib/access/permissions';

export const metadata: Metadata = { title: 'New population' };

export default async function NewPopulationPage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const query = await searchParams;
  return (
    <PopulationBuilder
      collaboration={actor.collaboration}
      versions={[]}
      previewRun={await widestRun(actor)}
      canShare={may(actor, 'share-population')}
      query={query}
      asked={askedSetting(query, undefined)}
    />
  );
}
