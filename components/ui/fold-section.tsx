'use client';

import { type ReactNode, useId, useState } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';
import { Icon } from './icon';
import { SectionOpener } from './section-opener';

interface FoldSectionProps {
  number?: number;
  title: ReactNode;
  context?: ReactNode;
  tools?: ReactNode;
  /** The section's answer in a few words: its subtitle while it is closed on a narrow screen. */
  answer: ReactNode;
  children: ReactNode;
  id?: string;
  /** The word that a mark behind the title explains. */
  help?: HelpWord;
}

/** A section that is open on wide screens and folds to its answer below 768 px. */
export function FoldSection(props: FoldSectionProps) {
  const { number, title, context, tools, answer, children, id, help } = props;
  const [isOpen, setOpen] = useState(false);
  const bodyId = useId();
  return (
    <section id={id}>
      <div className="max-md:hidden">
        <SectionOpener number={number} title={title} context={context} tools={tools} help={help} />
      </div>
      <h2 className="border-rule border-b md:hidden">
        <button
          type="button"
          className="grid w-full grid-cols-[18px_1fr_auto] items-center gap-1.5 py-[13px] text-left"
          aria-expanded={isOpen}
          aria-controls={bodyId}
          onClick={() => setOpen(!isOpen)}
        >
          <span className="self-start pt-[3px] font-normal text-ink3 text-note">{number}</span>
          <span>
            <span className="block text-value">{title}</span>
            <span className="block font-normal text-ink2 text-note">{answer}</span>
          </span>
          <Icon name={isOpen ? 'down' : 'next'} size={18} />
        </button>
      </h2>
      <div id={bodyId} className={isOpen ? 'max-md:py-4' : 'max-md:hidden'}>
        {(tools !== undefined || help !== undefined) && (
          <div className="mb-3 flex flex-wrap gap-3 text-note md:hidden">
            {help !== undefined && <HelpMark word={help} />}
            {tools}
          </div>
        )}
        {children}
      </div>
    </section>
  );
}
