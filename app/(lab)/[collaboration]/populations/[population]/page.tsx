import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { widestRun } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { askedSetting } from '@/components/populations/asked-setting';
import { PopulationBuilder } from '@/components/populations/population-builder';
import { may } from '@/lib/access/permissions';
import { listPopulations } from '@/lib/services/populations';

interface PageProps {
  params: Promise<{ collaboration: string; population: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await params).population };
}

export default async function PopulationPage({ params, searchParams }: PageProps) {
  const { collaboration, population: key } = await params;
  const actor = await currentActor(collaboration);
  const [{ populations }, run, query] = await Promise.all([
    listPopulations(actor),
    widestRun(actor),
    searchParams,
  ]);
  const versions = populations.filter((population) => population.key === key);
  const version =
    query.version === undefined
      ? versions[0]
      : versions.find((population) => String(population.version) === query.version);
  if (!version) notFound();
  return (
    <PopulationBuilder
      key={version.id}
      collaboration={actor.collaboration}
      versions={versions}
      version={version}
      previewRun={run}
      canShare={may(actor, 'share-population')}
      query={query}
      asked={askedSetting(query, version)}
    />
  );
}
