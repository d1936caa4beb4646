'use client';

import { useAction } from '@/components/hooks/use-action';
import { refreshShare } from '@/components/hooks/use-sharing';
import { Notice } from '@/components/ui/notice';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import type { SharedFrom } from '@/lib/schemas/sharing';
import { scopeWords } from './share-words';

/** Whose survey this is, how results name it, and whether it may still be used. */
export function SharedNotice({
  collaboration,
  name,
  shared,
  onRefreshed,
}: {
  collaboration: string;
  name: string;
  shared: SharedFrom;
  onRefreshed(): void;
}) {
  const day = useDay();
  const { perform, isBusy, problem } = useAction();
  const { owner, scope, attribution, copiedAt, version, withdrawnFrom, withdrawnWhy } = shared;
  const refresh = () =>
    perform(async () => {
      await refreshShare(collaboration, shared.shareId);
      onRefreshed();
    });
  return (
    <div className="my-3 grid gap-2">
      <Notice tone="neutral" title={`Shared by ${owner}, read only.`}>
        Copy of {scopeWords[scope]} of {day(copiedAt)}, version {version.slice(0, 8)}. Results that
        use it say: “{attribution}”
        {scope === 'maps' &&
          '. Its curves, files and ages stay with the owner, so adopted ages do not reach these maps.'}
      </Notice>
      {withdrawnFrom !== null && (
        <Notice
          tone={shared.isWithdrawn ? 'bad' : 'warn'}
          title={
            shared.isWithdrawn
              ? `Withdrawn on ${day(withdrawnFrom)}.`
              : `${owner} takes ${name} back on ${day(withdrawnFrom)}.`
          }
        >
          Reason: {withdrawnWhy}. Runs that were made stand; nothing new may use it
          {shared.isWithdrawn ? '' : ' from that day'}.
        </Notice>
      )}
      {shared.hasNewer === true && (
        <Notice
          tone="warn"
          title={`${owner} has changed ${name} since.`}
          actions={
            shared.canRefresh && (
              <TextAction onClick={() => void (isBusy || refresh())}>
                {isBusy ? 'Refreshing' : 'Refresh the copy'}
              </TextAction>
            )
          }
        >
          Earlier runs keep the version that they used.
        </Notice>
      )}
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
    </div>
  );
}
