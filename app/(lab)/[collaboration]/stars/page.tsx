import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ExportButton } from '@/components/exports/export-button';
import { StarsScreen } from '@/components/stars/stars-screen';
import { PageTitle } from '@/components/ui/page-title';
import { pack } from '@/lib/schemas/packed';
import { listStars } from '@/lib/services/stars';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Stars' };

export default async function StarsPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [stars, { surveys }] = await Promise.all([
    listStars(actor, { limit: 100, offset: 0 }),
    listSurveys(actor),
  ]);
  return (
    <>
      <PageTitle
        title="Stars"
        context={
          stars.counts.stars > 0 &&
          `${stars.counts.entries} entries, ${stars.counts.stars} stars, ${stars.counts.shared} of them in several surveys`
        }
        actions={
          stars.counts.stars > 0 && (
            <ExportButton
              collaboration={actor.collaboration}
              source={['stars']}
              title="Files of all stars"
            />
          )
        }
      />
      <StarsScreen collaboration={actor.collaboration} initial={pack(stars)} surveys={surveys} />
    </>
  );
}
