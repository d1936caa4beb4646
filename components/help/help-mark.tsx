'use client';

import dynamic from 'next/dynamic';
import { useRef, useState } from 'react';
import type { HelpWord } from '@/lib/help';

/** What opens is fetched when somebody asks: no page pays for it beforehand. */
const HelpPanel = dynamic(() => import('./help-panel').then((file) => file.HelpPanel));

const wordsOf = (word: string) => word.replaceAll('-', ' ');

/** A small mark beside a quantity that opens its definition in place. */
export function HelpMark({ word, className = '' }: { word: HelpWord; className?: string }) {
  const button = useRef<HTMLButtonElement>(null);
  const [isOpen, setOpen] = useState(false);
  return (
    <>
      <button
        ref={button}
        type="button"
        className={`help-mark ${className}`}
        aria-label={`What is meant: ${wordsOf(word)}`}
        aria-haspopup="dialog"
        aria-expanded={isOpen}
        onClick={() => setOpen(!isOpen)}
      >
        <span aria-hidden="true">?</span>
      </button>
      {isOpen && <HelpPanel word={word} anchor={button} onClose={() => setOpen(false)} />}
    </>
  );
}
