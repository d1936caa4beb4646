'use client';

import { useState } from 'react';
import { seriesColour } from '@/components/charts/series';
import type { Verdict } from '@/components/hooks/use-stars';
import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { SeriesKey } from '@/components/ui/series-key';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import { formatPlace, formatPlain } from '@/lib/quantities/display';
import type { StarMatchView } from '@/lib/schemas/stars';
import { ReasonDialog } from './reason-dialog';
import { evidenceWords } from './star-words';

interface PairCardProps {
  collaboration: string;
  pair: StarMatchView;
  canDecide: boolean;
  onDecide(verdict: Verdict, why: string): Promise<void>;
}

const questions: Record<Verdict, { title: string; action: string; words: string }> = {
  confirm: {
    title: 'Take the two for one star?',
    action: 'One star',
    words:
      'Later runs count it once and combine its maps by their rule. Runs that are there do not change, and this can be undone.',
  },
  refuse: {
    title: 'Keep the two apart?',
    action: 'Two stars',
    words: 'Later runs count both, and the pair is not proposed again. This can be undone.',
  },
  undo: {
    title: 'Take the decision back?',
    action: 'Undo',
    words: 'The pair is as it was before, and holds up runs that count both until it is decided.',
  },
};

const stateWords = { confirmed: 'one star', refused: 'kept apart', proposed: '', undone: '' };

function Side({ collaboration, star }: { collaboration: string; star: StarMatchView['stars'][0] }) {
  return (
    <div className="min-w-0">
      <Link className="font-semibold" href={`/${collaboration}/stars/${star.id}`}>
        {star.name}
      </Link>
      {star.entries.map((entry) => (
        <p key={entry.targetId} className="text-ink2 text-note">
          <SeriesKey colour={seriesColour(entry.survey.position)}>{entry.survey.name}</SeriesKey>{' '}
          {entry.name !== star.name && `as ${entry.name}, `}
          {entry.spectralType && `${entry.spectralType}, `}
          {entry.distancePc !== null && `${formatPlain(entry.distancePc)}\u00a0pc, `}
          {entry.raDeg !== null && entry.decDeg !== null ? (
            <span className="whitespace-nowrap">
              {formatPlace(entry.raDeg, entry.decDeg)} ({formatPlain(entry.epochYr, 6)})
            </span>
          ) : (
            'no position'
          )}
          {entry.pmRaMasYr !== null && entry.pmDecMasYr !== null && (
            <>
              , moves {formatPlain(entry.pmRaMasYr)}, {formatPlain(entry.pmDecMasYr)} mas/yr
            </>
          )}
        </p>
      ))}
    </div>
  );
}

/** Two stars side by side, what speaks for one, and the decision. */
export function PairCard({ collaboration, pair, canDecide, onDecide }: PairCardProps) {
  const day = useDay();
  const [asked, setAsked] = useState<Verdict | null>(null);
  const isDecided = pair.state === 'confirmed' || pair.state === 'refused';
  const question = asked && questions[asked];
  return (
    <li className="grid gap-x-8 gap-y-2 border-rule border-b py-3.5 md:grid-cols-2 xl:grid-cols-[1fr_1fr_minmax(230px,300px)]">
      {pair.stars.map((star, i) => (
        <Side
          key={pair.stars[0].id === star.id ? i : star.id}
          collaboration={collaboration}
          star={star}
        />
      ))}
      <div className="md:col-span-2 xl:col-span-1">
        <p className="text-ink2 text-note">{evidenceWords(pair.evidence)}</p>
        {pair.why !== null && (
          <p className="text-ink3 text-note">
            {isDecided ? stateWords[pair.state] : 'decision taken back'} by{' '}
            {pair.decidedBy ?? 'somebody who left'}
            {pair.decidedAt && `, ${day(pair.decidedAt)}`}: {pair.why}
          </p>
        )}
        {canDecide && (
          <div className="mt-2 flex flex-wrap gap-2">
            {isDecided ? (
              <TextAction onClick={() => setAsked('undo')}>Undo</TextAction>
            ) : (
              <>
                <Button size="small" onClick={() => setAsked('confirm')}>
                  One star
                </Button>
                <Button size="small" onClick={() => setAsked('refuse')}>
                  Keep apart
                </Button>
              </>
            )}
          </div>
        )}
      </div>
      {asked && question && (
        <ReasonDialog
          title={question.title}
          action={question.action}
          onClose={() => setAsked(null)}
          onDecide={(why) => onDecide(asked, why)}
        >
          <b>{pair.stars.map(({ name }) => name).join(' and ')}</b>: {question.words}
        </ReasonDialog>
      )}
    </li>
  );
}
