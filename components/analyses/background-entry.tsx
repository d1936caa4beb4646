'use client';

import { useState } from 'react';
import { NumberField } from '@/components/ui/number-field';

interface BackgroundEntryProps {
  value: number | undefined;
  onValue(value: number | undefined): void;
}

/** The expected number of false detections among those counted; empty: none. */
export function BackgroundEntry({ value, onValue }: BackgroundEntryProps) {
  const [text, setText] = useState(value === undefined ? '' : String(value));
  const isFine = text.trim() === '' || isAllowed(Number(text));
  return (
    <NumberField
      label="False detections expected"
      hint="Among those counted; empty for none."
      error={isFine ? undefined : 'Above 0, at most 1000.'}
      value={text}
      onChange={(event) => {
        const next = event.target.value;
        setText(next);
        // What is not a number reaches the recipe as such, and is refused there.
        onValue(next.trim() === '' ? undefined : Number(next));
      }}
    />
  );
}

const isAllowed = (value: number) => value > 0 && value <= 1000;
