'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import {
  type ReleaseStep,
  removeRelease,
  takeStep,
  useRelease,
  withdrawRelease,
} from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { DeleteForGood } from '@/components/ui/delete-for-good';
import { Dialog } from '@/components/ui/dialog';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { TextAreaField } from '@/components/ui/text-area-field';
import { describeLevel } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { DepositView } from '@/lib/schemas/deposits';
import type { GuestLinkView, ReleaseView } from '@/lib/schemas/releases';
import { DepositPart } from './deposit-part';
import { GiveLink } from './give-link';
import { GuestLinks } from './guest-links';
import { draftOf } from './release-draft';
import { ReleaseSteps } from './release-steps';
import { furtherGround, shortDigest, stateWords } from './release-words';

interface ReleaseScreenProps {
  collaboration: string;
  initial: ReleaseView;
  links: GuestLinkView[];
  deposit: DepositView;
  /** Public address, whether or not it answers yet. */
  address: string;
}

/** A release from draft to public page: its runs, its signatures, and the check between them. */
export function ReleaseScreen(props: ReleaseScreenProps) {
  const { collaboration, initial, links, address, deposit } = props;
  const router = useRouter();
  const { data: release = initial, mutate } = useRelease(collaboration, initial);
  const { perform, isBusy, problem } = useAction();
  const [pressed, setPressed] = useState<ReleaseStep | 'withdraw'>();
  const busy = isBusy ? pressed : undefined;
  const [isWithdrawing, setWithdrawing] = useState(false);
  const [reason, setReason] = useState('');
  const { kind, words } = stateWords[release.state];
  const change = (name: ReleaseStep | 'withdraw', task: () => Promise<ReleaseView>) => {
    setPressed(name);
    return perform(async () => mutate(await task(), { revalidate: false }));
  };
  const step = (name: ReleaseStep) =>
    void change(name, () => takeStep(collaboration, release.id, name));
  const withdraw = async () => {
    const isDone = await change('withdraw', () =>
      withdrawRelease(collaboration, release.id, reason.trim()),
    );
    if (isDone) setWithdrawing(false);
  };
  const isPublic = release.state === 'published' || release.state === 'withdrawn';
  return (
    <>
      <PageTitle
        title={release.title}
        crumbs={[{ href: `/${collaboration}/releases`, label: 'Releases' }, { label: release.key }]}
        state={<StateMark kind={kind}>{words}</StateMark>}
        context={release.authors.map(({ name }) => name).join(', ')}
        actions={
          <>
            {release.can.change && (
              <LinkButton href={`/${collaboration}/releases/${release.key}/edit`}>
                Change
              </LinkButton>
            )}
            {release.can.link && release.state !== 'withdrawn' && (
              <GiveLink
                collaboration={collaboration}
                opens={release.key}
                target={{ releaseId: release.id }}
              />
            )}
            {isPublic && (
              <LinkButton href={`/r/${release.code}`} variant="primary">
                Public page
              </LinkButton>
            )}
          </>
        }
      />
      <div className="mb-4 grid gap-3 empty:hidden">
        {problem !== undefined && (
          <Notice tone="bad" title="It was not done." isAnnounced>
            {problem}
          </Notice>
        )}
        {release.withdrawn && (
          <Notice tone="bad" title={`Withdrawn by ${release.withdrawn.by}.`}>
            {release.withdrawn.reason}
          </Notice>
        )}
      </div>
      <div className="grid gap-x-12 gap-y-8 pb-10 lg:grid-cols-2 lg:grid-rows-[auto_1fr]">
        <section className="min-w-0">
          <SectionOpener number={1} title="Runs" />
          <ul className="text-note">
            {release.runs.map((run) => (
              <li key={run.id} className="border-rule border-b py-2.5">
                <p className="flex flex-wrap items-baseline justify-between gap-x-4">
                  <Link href={`/${collaboration}/releases/freeze/${run.id}`}>
                    {run.analysisKey}, run {run.number}
                  </Link>
                  <span>
                    <b className="limit">{formatLimit(run.limit, run.quantity)}</b> (
                    {describeLevel(run.credibleLevel)})
                  </span>
                </p>
                <p>
                  {run.sentence}, {furtherGround(run)}.
                </p>
                <p className="text-ink3">
                  frozen by {run.frozenBy}; result{' '}
                  <span title={run.resultDigest}>{shortDigest(run.resultDigest)}</span>
                </p>
              </li>
            ))}
          </ul>
          <p className="mt-4 break-all text-note">
            <span className="text-ink3">
              {isPublic ? 'Public address' : 'Public address, once it is published'}:{' '}
            </span>
            {address}
          </p>
          {release.abstract !== '' && (
            <p className="mt-3 max-w-[72ch] whitespace-pre-wrap text-ink2">{release.abstract}</p>
          )}
          <p className="mt-3 text-ink3 text-note">
            Licence {release.licence}
            {release.replaces && `; replaces ${release.replaces.key}`}
            {release.replacedBy && `; replaced by ${release.replacedBy.key}`}
          </p>
        </section>
        <section className="min-w-0 lg:row-span-2">
          <SectionOpener number={2} title="On its way to the public" />
          <ReleaseSteps release={release} busy={busy} onStep={step} />
          <div className="mt-5 flex flex-wrap gap-2">
            {release.can.withdraw && <Button onClick={() => setWithdrawing(true)}>Withdraw</Button>}
            {release.can.change && (
              <DeleteForGood
                label="Delete the draft"
                warning="The draft goes for good; its runs stay."
                onDelete={() => removeRelease(collaboration, release.id, draftOf, draftOf(release))}
                onDeleted={() => {
                  router.push(`/${collaboration}/releases`);
                  router.refresh();
                }}
                onRefused={() => void mutate()}
              />
            )}
          </div>
          {release.state === 'published' && (
            <DepositPart collaboration={collaboration} release={release} initial={deposit} />
          )}
        </section>
        <div className="min-w-0">
          <GuestLinks
            collaboration={collaboration}
            initial={links}
            canEnd={release.can.link}
            opens={release.key}
          />
        </div>
      </div>
      <Dialog
        isOpen={isWithdrawing}
        onClose={() => setWithdrawing(false)}
        title={`Withdraw ${release.key}`}
        actions={
          <>
            <Button
              variant="primary"
              onClick={() => void withdraw()}
              isBusy={busy === 'withdraw'}
              disabledReason={reason.trim() === '' ? 'Say why: it stands on the page.' : undefined}
            >
              Withdraw it
            </Button>
            <Button onClick={() => setWithdrawing(false)}>Leave it</Button>
          </>
        }
      >
        <p className="mb-3 text-ink2 text-note">
          Its address stays and says that it was withdrawn, when and why. Numbers and files are gone
          from the page for good.
        </p>
        <TextAreaField
          label="Reason"
          rows={3}
          maxLength={1000}
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
      </Dialog>
    </>
  );
}
