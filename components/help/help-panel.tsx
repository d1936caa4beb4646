'use client';

import * as Popover from '@radix-ui/react-popover';
import { type RefObject, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useHelp } from '@/components/hooks/use-help';
import { Icon } from '@/components/ui/icon';
import type { HelpDefinition } from '@/lib/schemas/help';
import { Formulas, TypesetText } from './typeset';

interface HelpPanelProps {
  word: string;
  /** The mark that was pressed: the panel stands beside it and gives the focus back to it. */
  anchor: RefObject<HTMLButtonElement | null>;
  onClose(): void;
}

/** Below this, half of the definitions would have to be scrolled [px]. */
const ROOM_NEEDED = 340;

/** Its height follows the room on its side, so it never finds by itself that there is too little. */
function sideWithRoom(anchor: HTMLElement | null): 'top' | 'bottom' {
  if (anchor === null) return 'bottom';
  const { top, bottom } = anchor.getBoundingClientRect();
  const below = window.innerHeight - bottom;
  return below < ROOM_NEEDED && top > below ? 'top' : 'bottom';
}

/** A word's definition beside the place where it was asked for. */
export function HelpPanel({ word: first, anchor, onClose }: HelpPanelProps) {
  const [word, setWord] = useState(first);
  const [side] = useState(() => sideWithRoom(anchor.current));
  const { data, error } = useHelp(word);
  // What lies in a modal dialogue is above everything else: the panel has to open inside it.
  const container = anchor.current?.closest('dialog, [role="dialog"]') as HTMLElement | null;
  return (
    <Popover.Root open onOpenChange={(isOpen) => !isOpen && onClose()}>
      <Popover.Anchor virtualRef={anchor as RefObject<HTMLButtonElement>} />
      <Popover.Portal container={container ?? undefined}>
        <Popover.Content
          aria-label={data?.title ?? 'Definition'}
          side={side}
          align="start"
          sideOffset={6}
          collisionPadding={12}
          className="help-panel"
          onCloseAutoFocus={(event) => {
            event.preventDefault();
            anchor.current?.focus();
          }}
          onInteractOutside={(event) => {
            // The mark closes what it opened by itself.
            if (anchor.current?.contains(event.target as Node)) event.preventDefault();
          }}
        >
          <Popover.Close className="absolute top-1.5 right-1.5 flex size-9 items-center justify-center rounded text-ink3 max-md:size-11">
            <Icon name="close" />
            <span className="sr-only">Close the definition</span>
          </Popover.Close>
          {data ? (
            <Definition definition={data} onWord={setWord} />
          ) : (
            <p className="py-6 text-ink3 text-note" role="status">
              {error === undefined ? 'Fetching the definition' : sentenceOf(error)}
            </p>
          )}
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  );
}

function Definition({
  definition,
  onWord,
}: {
  definition: HelpDefinition;
  onWord(word: string): void;
}) {
  const { word, title, paragraph, formulas, units, source, seeAlso } = definition;
  return (
    <div className="grid gap-3 text-note">
      <h2 className="pr-9 text-section">{title}</h2>
      <p className="text-body">
        <TypesetText parts={paragraph} />
      </p>
      <Formulas formulas={formulas} />
      <dl className="grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-[3px] text-ink2">
        <dt className="text-ink3">Units</dt>
        <dd>{units}</dd>
        <dt className="text-ink3">Source</dt>
        <dd>{source}</dd>
      </dl>
      <p className="flex flex-wrap gap-x-3 text-ink3">
        <span className="py-1">See also</span>
        {seeAlso.map((other) => (
          <button
            key={other.word}
            type="button"
            className="py-1 text-act underline decoration-rule2 underline-offset-2"
            onClick={() => onWord(other.word)}
          >
            {other.title}
          </button>
        ))}
      </p>
      <p>
        <a className="font-semibold" href={`/help/${word}`}>
          The whole entry, with its place in the help
        </a>
      </p>
    </div>
  );
}
