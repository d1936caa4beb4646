import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { AgesScreen } from '@/components/stars/ages-screen';
import { PageTitle } from '@/components/ui/page-title';
import { may } from '@/lib/access/permissions';
import { listValueTables } from '@/lib/services/star-values';
import { listStars } from '@/lib/services/stars';

export const metadata: Metadata = { title: 'Ages and distances' };

const FIRST = { limit: 100, offset: 0 };

export default async function AgesPage({ params }: { params: Promise<{ collaboration: string }> }) {
  const actor = await currentActor((await params).collaboration);
  const [ages, distances, { tables }] = await Promise.all([
    listStars(actor, { ...FIRST, only: 'age-conflict' }),
    listStars(actor, { ...FIRST, only: 'distance-conflict' }),
    listValueTables(actor),
  ]);
  return (
    <>
      <PageTitle
        title="Ages and distances"
        context="one adopted value a star, in numbered tables"
      />
      <AgesScreen
        collaboration={actor.collaboration}
        ages={ages}
        distances={distances}
        tables={tables}
        canAdopt={may(actor, 'adopt-values')}
      />
    </>
  );
}
