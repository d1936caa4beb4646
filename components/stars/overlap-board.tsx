'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import {
  confirmPairs,
  decidePair,
  proposePairs,
  useOverlaps,
  type Verdict,
} from '@/components/hooks/use-stars';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import type { Overlaps, StarMatchView } from '@/lib/schemas/stars';
import { PairCard } from './pair-card';
import { PlainPairs } from './plain-pairs';
import { StarTabs } from './star-tabs';

interface OverlapBoardProps {
  collaboration: string;
  initial: Overlaps;
}

/** As many as the route takes in one request. */
const MOST_AT_ONCE = 500;

/** Pairs that may be one star: what speaks for it, and a person's word. */
export function OverlapBoard({ collaboration, initial }: OverlapBoardProps) {
  const { data = initial, mutate } = useOverlaps(collaboration, initial);
  const [said, setSaid] = useState<{ tone: 'ok' | 'bad'; words: string } | null>(null);
  const { open, decided, automatic, entries, stars, canDecide } = data;
  const decide = async (pair: string, verdict: Verdict, why: string) => {
    await mutate(await decidePair(collaboration, pair, verdict, why), { revalidate: false });
  };
  const confirm = async (pairs: string[], why: string) => {
    await mutate(await confirmPairs(collaboration, pairs, why), { revalidate: false });
    setSaid({
      tone: 'ok',
      words: pairs.length === 1 ? '1 pair joined' : `${pairs.length} pairs joined`,
    });
  };
  const plain = open.filter(({ isPlain }) => isPlain).slice(0, MOST_AT_ONCE);
  const look = async () => {
    try {
      const found = await proposePairs(collaboration);
      setSaid({ tone: 'ok', words: found === 1 ? '1 new pair' : `${found} new pairs` });
      await mutate();
    } catch (failure) {
      setSaid({ tone: 'bad', words: sentenceOf(failure) });
    }
  };
  const cards = (pairs: StarMatchView[]) => (
    <ul>
      {pairs.map((pair) => (
        <PairCard
          key={pair.id}
          collaboration={collaboration}
          pair={pair}
          canDecide={canDecide}
          onDecide={(verdict, why) => decide(pair.id, verdict, why)}
        />
      ))}
    </ul>
  );
  return (
    <>
      <StarTabs
        collaboration={collaboration}
        current="overlaps"
        stars={stars}
        undecided={open.length}
      />
      <p className="mb-6 max-w-[72ch] text-ink2">
        {entries} entries, {stars} stars. {automatic.identifier} entries were joined to a known star
        by Gaia number and {automatic.name} by a name when their tables were stored; each can be
        parted on the star’s page. Entries within 5″ after proper motion whose distances agree
        within 10{'\u2009'}% are proposed here, and a run that counts both waits for the decision.
      </p>
      <section className="mb-9">
        <SectionOpener
          title="To decide"
          context={
            open.length === 1 ? '1 pair, surest first' : `${open.length} pairs, surest first`
          }
          tools={
            canDecide && (
              <>
                {plain.length > 1 && <PlainPairs pairs={plain} onConfirm={confirm} />}
                <Button onClick={() => void look()}>Look again</Button>
              </>
            )
          }
        />
        {said && <Notice tone={said.tone} title={said.words} isAnnounced />}
        {open.length > 0 ? cards(open) : <p className="py-2 text-ink3">No pair waits.</p>}
      </section>
      <section>
        <SectionOpener title="Decided" context={`${decided.length} pairs, newest first`} />
        {decided.length > 0 ? cards(decided) : <p className="py-2 text-ink3">Nothing yet.</p>}
      </section>
    </>
  );
}
