'use client';

import { type ComponentProps, useContext, useState } from 'react';
import { NumberField } from '@/components/ui/number-field';
import { ReportFault, useFault } from './faulty-fields';

interface NumberEntryProps
  extends Omit<ComponentProps<typeof NumberField>, 'label' | 'onChange' | 'value'> {
  label: string;
  value: number;
  /** What makes no sense yet is kept in the field and not passed on. */
  isAllowed(value: number): boolean;
  /** What would be allowed, shown while the field holds something else. */
  expected: string;
  onValue(value: number): void;
}

/** A number field that may be half typed: only a whole, allowed number leaves it. */
export function NumberEntry({ value, isAllowed, expected, onValue, ...field }: NumberEntryProps) {
  const [text, setText] = useState(String(value));
  const [known, setKnown] = useState(value);
  if (known !== value) {
    setKnown(value);
    if (Number(text) !== value) setText(String(value));
  }
  const typed = text.trim() === '' ? Number.NaN : Number(text);
  const isFine = Number.isFinite(typed) && isAllowed(typed);
  useFault(useContext(ReportFault), isFine ? undefined : `${field.label}: ${expected}`);
  return (
    <NumberField
      {...field}
      value={text}
      error={isFine ? undefined : expected}
      onChange={(event) => {
        setText(event.target.value);
        const next = event.target.value.trim() === '' ? Number.NaN : Number(event.target.value);
        if (Number.isFinite(next) && isAllowed(next)) onValue(next);
      }}
    />
  );
}
