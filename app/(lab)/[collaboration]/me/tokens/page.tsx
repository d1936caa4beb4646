import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { TokenPanel } from '@/components/people/token-panel';
import { PageTitle } from '@/components/ui/page-title';
import { config } from '@/lib/config';
import { listTokens } from '@/lib/services/tokens';

export const metadata: Metadata = { title: 'API tokens' };

export default async function TokensPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { tokens } = await listTokens(actor);
  return (
    <>
      <PageTitle
        title="API tokens"
        context="A token reaches this collaboration only, with no more than your own roles"
      />
      <div className="mt-2">
        <TokenPanel
          collaboration={actor.collaboration}
          address={config().webAddress}
          initial={tokens}
        />
      </div>
    </>
  );
}
