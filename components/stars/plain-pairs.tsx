'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import type { StarMatchView } from '@/lib/schemas/stars';
import { ReasonDialog } from './reason-dialog';
import { evidenceWords } from './star-words';

interface PlainPairsProps {
  pairs: StarMatchView[];
  onConfirm(ids: string[], why: string): Promise<void>;
}

/** Takes the plain pairs together; each is listed with what speaks for it, and can be left out. */
export function PlainPairs({ pairs, onConfirm }: PlainPairsProps) {
  const [isOpen, setOpen] = useState(false);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const taken = pairs.filter(({ id }) => !left.has(id));
  const toggle = (id: string) => {
    const next = new Set(left);
    if (!next.delete(id)) next.add(id);
    setLeft(next);
  };
  return (
    <>
      <Button onClick={() => setOpen(true)}>Decide {pairs.length} plain pairs</Button>
      {isOpen && (
        <ReasonDialog
          title="Take each of these pairs for one star?"
          action={taken.length === 1 ? 'Join 1 pair' : `Join ${taken.length} pairs`}
          missing={taken.length === 0 ? 'Tick at least one pair' : undefined}
          onClose={() => setOpen(false)}
          onDecide={(why) =>
            onConfirm(
              taken.map(({ id }) => id),
              why,
            )
          }
        >
          <p className="mb-2">
            They share a number or a name, or lie within 1″ and 2{'\u2009'}% in distance, and none
            of their stars waits in another pair. Later runs count each once; each can be undone by
            itself.
          </p>
          <div className="max-h-72 overflow-y-auto">
            <fieldset className="grid gap-1">
              <legend className="sr-only">Pairs</legend>
              {pairs.map((pair) => (
                <CheckboxField
                  key={pair.id}
                  label={pair.stars.map(({ name }) => name).join(' and ')}
                  hint={evidenceWords(pair.evidence)}
                  checked={!left.has(pair.id)}
                  onChange={() => toggle(pair.id)}
                />
              ))}
            </fieldset>
          </div>
        </ReasonDialog>
      )}
    </>
  );
}
