'use client';

import { useEffect, useRef } from 'react';
import { TextField } from '@/components/ui/text-field';
import { CODE_IS_ASKED } from '@/lib/schemas/sign-in-words';

interface SecondFactorFieldProps {
  value: string;
  onChange(value: string): void;
}

/** Appears when everything else was right, and takes the keyboard then. */
export function SecondFactorField({ value, onChange }: SecondFactorFieldProps) {
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => input.current?.focus(), []);
  return (
    <TextField
      ref={input}
      label="Code"
      hint={CODE_IS_ASKED}
      value={value}
      autoComplete="one-time-code"
      autoCapitalize="none"
      spellCheck={false}
      maxLength={40}
      required
      onChange={({ target }) => onChange(target.value)}
    />
  );
}
