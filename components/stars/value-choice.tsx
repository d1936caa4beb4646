'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { TextAction } from '@/components/ui/text-action';
import type { AdoptedQuantity, Adoption, AdoptionChoices, StarView } from '@/lib/schemas/stars';
import { ageWords, conflictWords, distanceWords } from './star-words';

const AdoptDialog = dynamic(async () => (await import('./adopt-dialog')).AdoptDialog);
const OutsideValue = dynamic(async () => (await import('./outside-value')).OutsideValue);

interface ValueChoiceProps {
  collaboration: string;
  star: StarView;
  quantity: AdoptedQuantity;
  canAdopt: boolean;
  onChanged(): void;
}

type Asked = { words: string; choice: Adoption['choice'] };

/** What each survey says of one quantity, what maps rest on, and the choice between them. */
export function ValueChoice(props: ValueChoiceProps) {
  const { collaboration, star, quantity, canAdopt, onChanged } = props;
  const [asked, setAsked] = useState<Asked | null>(null);
  const [isOutside, setOutside] = useState(false);
  const choicesOf = (choice: Adoption['choice']) =>
    ({ quantity, choices: [{ starId: star.id, choice }] }) as AdoptionChoices;
  const held = star[quantity];
  const wordsOf = (entry: Pick<StarView['entries'][0], 'age' | 'distance'>) => {
    if (quantity === 'age') return entry.age && ageWords(entry.age);
    return entry.distance && distanceWords(entry.distance);
  };
  const conflict = conflictWords(star.conflicts[quantity]);
  const isAdopted = held?.source.kind === 'adopted';
  return (
    <div className="min-w-0">
      <p className="mb-1 font-semibold capitalize">
        {quantity}
        {conflict !== null && (
          <span
            className={`ml-2 font-normal normal-case text-note ${isAdopted ? 'text-ink3' : 'text-warn'}`}
          >
            surveys are {conflict}
          </span>
        )}
      </p>
      <ul className="text-note">
        {star.entries.map((entry) => {
          const words = wordsOf(entry);
          return (
            <li key={entry.targetId} className="flex flex-wrap gap-x-3 border-rule border-b py-1.5">
              <span className="min-w-[9ch] text-ink3">{entry.survey.name}</span>
              <span className="flex-1 whitespace-nowrap">{words ?? 'not given'}</span>
              {entry.reference !== null && <span className="text-ink3">{entry.reference}</span>}
              {canAdopt && words && (
                <TextAction
                  onClick={() =>
                    setAsked({
                      words: `${words}, from ${entry.survey.name}`,
                      choice: { kind: 'entry', targetId: entry.targetId },
                    })
                  }
                >
                  Adopt
                  <span className="sr-only">
                    {' '}
                    {words} of {entry.survey.name}
                  </span>
                </TextAction>
              )}
            </li>
          );
        })}
        <li className="flex flex-wrap gap-x-3 py-1.5">
          <span className="min-w-[9ch] text-ink3">used</span>
          <b className="flex-1 whitespace-nowrap">
            {held
              ? wordsOf({ age: star.age?.value ?? null, distance: star.distance?.value ?? null })
              : 'none'}
          </b>
          {held && <span className="text-ink3">{held.source.words}</span>}
          {canAdopt && isAdopted && (
            <TextAction
              onClick={() =>
                setAsked({ words: 'each survey’s own value', choice: { kind: 'none' } })
              }
            >
              Take back
            </TextAction>
          )}
        </li>
      </ul>
      {canAdopt && (
        <TextAction onClick={() => setOutside(true)}>
          Adopt another {quantity}
          <span className="sr-only"> of {star.name}</span>
        </TextAction>
      )}
      {asked && (
        <AdoptDialog
          collaboration={collaboration}
          title={`Use ${asked.words}?`}
          choices={choicesOf(asked.choice)}
          onClose={() => setAsked(null)}
          onAdopted={onChanged}
        >
          <p className="text-ink2">
            It holds for all entries of {star.name}; their maps are made anew. Runs that are there
            keep the table that they used.
          </p>
        </AdoptDialog>
      )}
      {isOutside && (
        <OutsideValue
          collaboration={collaboration}
          star={star}
          quantity={quantity}
          onClose={() => setOutside(false)}
          onAdopted={onChanged}
        />
      )}
    </div>
  );
}
