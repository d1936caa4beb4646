import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { NotAllowed } from '@/components/settings/not-allowed';
import { WorkScreen } from '@/components/settings/work/work-screen';
import { may } from '@/lib/access/permissions';
import { getWork } from '@/lib/services/work';

export const metadata: Metadata = { title: 'Queue and workers' };

export default async function WorkPage({ params }: { params: Promise<{ collaboration: string }> }) {
  const actor = await currentActor((await params).collaboration);
  if (!may(actor, 'watch-work')) {
    return (
      <NotAllowed
        title="Queue and workers"
        fact="Only an owner sees the queue as a whole."
        instead="What is being computed just now stands under the work menu of every page."
        link={{ href: `/${actor.collaboration}`, label: 'Open the overview' }}
      />
    );
  }
  return <WorkScreen collaboration={actor.collaboration} initial={await getWork(actor)} />;
}
