'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { acceptShare, refuseShare } from '@/components/hooks/use-sharing';
import { ReasonDialog } from '@/components/stars/reason-dialog';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { StateMark } from '@/components/ui/state-mark';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import type { ShareView } from '@/lib/schemas/sharing';
import { holdsWords, scopeWords, stateWords } from './share-words';
import { WithdrawShareDialog } from './withdraw-share-dialog';

interface ShareListProps {
  collaboration: string;
  shares: ShareView[];
  onChanged(): void;
}

/** Offers, each with what it holds, on which terms, and where it stands. */
export function ShareList({ collaboration, shares, onChanged }: ShareListProps) {
  const { perform, isBusy, problem } = useAction();
  const [pressed, setPressed] = useState<string>();
  const [asked, setAsked] = useState<{ share: ShareView; verb: 'refuse' | 'withdraw' } | null>(
    null,
  );
  const accept = (share: ShareView) => {
    setPressed(share.id);
    return perform(async () => {
      await acceptShare(collaboration, share.id);
      onChanged();
    });
  };
  return (
    <>
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      <ul>
        {shares.map((share) => (
          <li key={share.id} className="grid gap-x-6 gap-y-2 border-rule border-b py-3 md:flex">
            <div className="min-w-0 flex-1">
              <p>
                <ShareName collaboration={collaboration} share={share} />
                <span className="text-ink2">, {scopeWords[share.scope]}</span>
              </p>
              <p className="break-words text-ink2 text-note">
                {[
                  holdsWords(share),
                  share.offeredBy && `offered by ${share.offeredBy}`,
                  `attribution: “${share.attribution}”`,
                ]
                  .filter(Boolean)
                  .join('; ')}
              </p>
              {share.note !== '' && (
                <p className="whitespace-pre-line break-words text-ink3 text-note">{share.note}</p>
              )}
              <p className="mt-1 text-note">
                <ShareState share={share} />
              </p>
            </div>
            <div className="flex flex-wrap items-center gap-x-4 gap-y-2 self-start">
              {share.can.accept && (
                <>
                  <Button
                    isBusy={isBusy && pressed === share.id}
                    onClick={() => void accept(share)}
                  >
                    Accept<span className="sr-only"> {share.survey.name}</span>
                  </Button>
                  <TextAction onClick={() => setAsked({ share, verb: 'refuse' })}>
                    Refuse<span className="sr-only"> {share.survey.name}</span>
                  </TextAction>
                </>
              )}
              {share.can.withdraw && (
                <TextAction onClick={() => setAsked({ share, verb: 'withdraw' })}>
                  {share.copiedAt === null ? 'Take back' : 'Withdraw'}
                  <span className="sr-only">
                    {' '}
                    {share.survey.name}, {share.other}
                  </span>
                </TextAction>
              )}
            </div>
          </li>
        ))}
      </ul>
      {asked?.verb === 'refuse' && (
        <ReasonDialog
          title={`Refuse ${asked.share.survey.name}`}
          action="Refuse"
          onClose={() => setAsked(null)}
          onDecide={async (why) => {
            await refuseShare(collaboration, asked.share.id, why);
            onChanged();
          }}
        >
          {asked.share.other} reads the reason. Nothing of the survey is kept here.
        </ReasonDialog>
      )}
      {asked?.verb === 'withdraw' && (
        <WithdrawShareDialog
          collaboration={collaboration}
          share={asked.share}
          onClose={() => setAsked(null)}
          onWithdrawn={onChanged}
        />
      )}
    </>
  );
}

function ShareName({ collaboration, share }: { collaboration: string; share: ShareView }) {
  const { survey, direction, other } = share;
  const name =
    survey.slug === null ? (
      <b>{survey.name}</b>
    ) : (
      <Link className="font-semibold" href={`/${collaboration}/surveys/${survey.slug}`}>
        {survey.name}
      </Link>
    );
  return direction === 'given' ? (
    <>
      {name} to {other}
    </>
  ) : (
    <>
      {name} from {other}
    </>
  );
}

function ShareState({ share }: { share: ShareView }) {
  const { kind, words } = stateWords(share, useDay());
  return <StateMark kind={kind}>{words}</StateMark>;
}
