'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { unlinkOrcid } from '@/components/hooks/use-me';
import { leaveForOrcid } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';

interface OrcidSectionProps {
  initial: string | null;
  /** Whether this server can ask ORCID at all. */
  isOffered: boolean;
  /** What became of linking, when the browser comes back from it. */
  outcome: 'linked' | 'taken' | null;
}

/** The person's ORCID iD: another way in, and the author's iD on what they release. */
export function OrcidSection({ initial, isOffered, outcome }: OrcidSectionProps) {
  const [orcid, setOrcid] = useState(initial);
  const [seen, setSeen] = useState(outcome);
  const [refusal, setRefusal] = useState<string | null>(null);
  const unlink = async () => {
    setRefusal(null);
    setSeen(null);
    try {
      await unlinkOrcid();
      setOrcid(null);
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <section className="min-w-0">
      <SectionOpener title="ORCID iD" context="signs you in, and names you on releases" />
      <div className="flex max-w-[440px] flex-col gap-4">
        {seen === 'linked' && <Notice tone="ok" title="Your ORCID iD is linked." isAnnounced />}
        {seen === 'taken' && (
          <Notice tone="bad" title="Another account is linked with this iD." isAnnounced>
            Sign in there and unlink it first.
          </Notice>
        )}
        {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
        {orcid !== null && (
          <p className="flex flex-wrap gap-x-5 gap-y-1 text-note">
            <span className="whitespace-nowrap">{orcid}</span>
            <TextAction onClick={() => void unlink()}>
              Unlink<span className="sr-only"> the ORCID iD</span>
            </TextAction>
          </p>
        )}
        {orcid === null && (
          <p className="text-ink3 text-note">
            None is linked.{' '}
            {isOffered
              ? 'ORCID asks you to sign in there.'
              : 'This server is not set up for ORCID.'}
          </p>
        )}
        {orcid === null && isOffered && (
          <div>
            <Button onClick={() => void leaveForOrcid('orcid-link', window.location.pathname)}>
              Link your ORCID iD
            </Button>
          </div>
        )}
      </div>
    </section>
  );
}
