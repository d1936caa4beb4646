'use client';

import { Fragment, useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { bundleAddress, freezeRun } from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { FormulaWords } from '@/components/ui/formula-words';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { TextAreaField } from '@/components/ui/text-area-field';
import { useDay } from '@/components/ui/time-zone';
import type { FreezeStanding, GuestLinkView } from '@/lib/schemas/releases';
import { GiveLink } from './give-link';
import { GuestLinks } from './guest-links';
import { shortDigest } from './release-words';

interface FreezeScreenProps {
  collaboration: string;
  initial: FreezeStanding;
  sentence: string;
  conditions: string[];
  canRelease: boolean;
  links: GuestLinkView[];
  /** Whoever may freeze it, for those who may not; nobody in an archived collaboration. */
  askable: { id: string; name: string }[];
}

/** What freezing means, its checks, the reason where one is asked for, and what may follow. */
export function FreezeScreen(props: FreezeScreenProps) {
  const day = useDay();
  const { collaboration, initial, sentence, conditions, canRelease, links, askable } = props;
  const [standing, setStanding] = useState(initial);
  const [reason, setReason] = useState('');
  const { perform, isBusy, problem } = useAction();
  const { run, checks, frozen } = standing;
  const name = `${run.analysisKey}, run ${run.number}`;
  const stopping = checks.find(({ isMet, stops }) => stops && !isMet);
  const needsReason = checks.some(({ isMet }) => !isMet);
  const freeze = () =>
    perform(async () => setStanding(await freezeRun(collaboration, run.id, reason.trim())));
  return (
    <>
      <PageTitle
        title={frozen ? `${name} is frozen` : `Freeze ${name}`}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { href: `/${collaboration}/analyses/${run.analysisKey}`, label: run.analysisKey },
          { label: frozen ? 'Frozen' : 'Freeze' },
        ]}
        state={frozen && <StateMark kind="frozen">frozen</StateMark>}
        context={`${sentence}.`}
        actions={
          <LinkButton href={bundleAddress(collaboration, run.id)} icon="download" isDownload>
            Bundle of this run
          </LinkButton>
        }
      />
      <div className="grid gap-x-12 gap-y-8 pb-10 lg:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="Checks" />
          <ul className="text-note">
            {checks.map((check) => (
              <li key={check.name} className="flex gap-2.5 border-rule border-b py-2.5">
                <span className={check.isMet ? 'text-ok' : check.stops ? 'text-bad' : 'text-warn'}>
                  <Icon name={check.isMet ? 'ok' : check.stops ? 'bad' : 'warn'} size={16} />
                </span>
                <span>
                  {check.words}
                  {!check.isMet && !check.stops && !frozen && standing.canFreeze && (
                    <span className="block text-ink3">A reason is asked for.</span>
                  )}
                </span>
              </li>
            ))}
          </ul>
          <div className="mt-5">
            {frozen ? (
              <>
                <p className="text-ink2">
                  Frozen by {frozen.by} on {day(frozen.at)}, with its inputs (fingerprint{' '}
                  <span title={frozen.sha256}>{shortDigest(frozen.sha256)}</span>). It cannot
                  change.
                </p>
                {frozen.reason !== null && (
                  <p className="mt-2 text-ink2">Reason given: {frozen.reason}</p>
                )}
                <div className="mt-4 flex flex-wrap gap-2">
                  {canRelease && (
                    <LinkButton
                      href={`/${collaboration}/releases/new?run=${run.id}`}
                      variant="primary"
                    >
                      Release it
                    </LinkButton>
                  )}
                  {standing.canLink && (
                    <GiveLink
                      collaboration={collaboration}
                      opens={name}
                      target={{ runId: run.id }}
                    />
                  )}
                </div>
              </>
            ) : standing.canFreeze ? (
              <div className="grid gap-3">
                {needsReason && !stopping && (
                  <TextAreaField
                    label="Reason"
                    hint="stands in the seal of every release of this run"
                    rows={3}
                    maxLength={1000}
                    value={reason}
                    onChange={(event) => setReason(event.target.value)}
                  />
                )}
                {problem !== undefined && (
                  <Notice tone="bad" title="It was not frozen." isAnnounced>
                    {problem}
                  </Notice>
                )}
                <div>
                  <Button
                    variant="primary"
                    icon="lock"
                    isBusy={isBusy}
                    onClick={() => void freeze()}
                    disabledReason={
                      stopping
                        ? `${stopping.words}.`
                        : needsReason && reason.trim() === ''
                          ? 'Say why, although a check is not met.'
                          : undefined
                    }
                  >
                    Freeze {name}
                  </Button>
                </div>
              </div>
            ) : (
              <Notice
                tone="neutral"
                icon="lock"
                title={
                  askable.length === 0
                    ? 'This collaboration is archived.'
                    : 'An author or an owner freezes runs.'
                }
              >
                {askable.length === 0 ? (
                  'Nothing in it changes until an owner opens it again in its settings.'
                ) : (
                  <>
                    Ask {askable.length > 1 && 'one of them: '}
                    {askable.map((person, i) => (
                      <Fragment key={person.id}>
                        {i > 0 && ', '}
                        <bdi>{person.name}</bdi>
                      </Fragment>
                    ))}
                    .{' '}
                    <Link
                      className="underline underline-offset-3"
                      href={`/${collaboration}/analyses/${run.analysisKey}#notes`}
                    >
                      Write a note on {run.analysisKey}
                    </Link>
                    : whom you name there with an @ gets a message.
                  </>
                )}
              </Notice>
            )}
          </div>
        </section>
        <section className="min-w-0">
          <SectionOpener title="What freezing keeps" />
          <p className="max-w-[60ch] text-ink2">
            Targets, curves, companions, cooling relations, population and settings are kept with
            the run as they are now. Later changes of the surveys cannot reach it, and it can be
            made again from what was kept.
          </p>
          <ul className="mt-3 max-w-[72ch] list-disc pl-5 text-ink3 text-note">
            {conditions.map((condition) => (
              <li key={condition}>
                <FormulaWords text={condition} />
              </li>
            ))}
          </ul>
          {frozen && (
            <div className="mt-8">
              <GuestLinks
                collaboration={collaboration}
                initial={links}
                canEnd={standing.canLink}
                opens={name}
              />
            </div>
          )}
        </section>
      </div>
    </>
  );
}
