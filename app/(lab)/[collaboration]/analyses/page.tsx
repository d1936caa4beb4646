import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { AnalysisList } from '@/components/analyses/analysis-list';
import { may } from '@/lib/access/permissions';
import { listAnalyses } from '@/lib/services/analyses';

export const metadata: Metadata = { title: 'Analyses' };

export default async function AnalysesPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { analyses } = await listAnalyses(actor);
  return (
    <AnalysisList
      collaboration={actor.collaboration}
      initial={analyses}
      canCreate={may(actor, 'save-analysis', { isOwn: true })}
    />
  );
}
