'use client';

import { type ChangeEvent, useState } from 'react';
import type { ZodType } from 'zod';
import { describeFault, type Fault, InputError } from '@/lib/errors';
import { parseInput } from '@/lib/schemas/input';

/** Texts of the fields, by the path of the setting: "massIndex.min". */
export type Draft = Record<string, string>;

interface FormOptions<Settings> {
  schema: ZodType<Settings>;
  start: Draft;
  /** The draft in the shape that the schema reads; what is no number stays undefined. */
  read(draft: Draft): unknown;
  /** Of the server. */
  faults: Fault[];
  onAsk(settings: Settings): void;
}

/** One sentence a field; a fault without a known field stands under ''. */
export function faultsByField(faults: Fault[], fields: string[]): Record<string, string> {
  const sentences: Record<string, string> = {};
  for (const { item, ...fault } of faults) {
    const named = (item ?? '').split(', ').find((name) => fields.includes(name)) ?? '';
    // That a kind cannot be asked at all is no fault of a field.
    const isPlaced = named === '' && item !== 'kind';
    const sentence = describeFault(isPlaced ? { ...fault, item } : fault);
    sentences[named] = [sentences[named], sentence].filter(Boolean).join('. ');
  }
  return sentences;
}

/** A number as a person types it: a comma for a point and a true minus are understood. */
export function readNumber(text: string): number | undefined {
  const plain = text.trim().replace('\u2212', '-').replace(',', '.');
  if (plain === '') return undefined;
  const value = Number(plain);
  return Number.isFinite(value) ? value : undefined;
}

/** Fields of a settings form, read by the schema that the server reads them by. */
export function useSettingsForm<Settings>(options: FormOptions<Settings>) {
  const { schema, start, read, onAsk } = options;
  const [draft, setDraft] = useState(start);
  const [found, setFound] = useState<Fault[]>([]);
  const errors = faultsByField([...found, ...options.faults], Object.keys(draft));
  const set = (name: string, value: string) => setDraft((last) => ({ ...last, [name]: value }));

  const submit = () => {
    try {
      const settings = parseInput(schema, read(draft));
      setFound([]);
      onAsk(settings);
    } catch (reason) {
      if (!(reason instanceof InputError)) throw reason;
      setFound(reason.faults);
    }
  };
  /** What an input takes to hold the setting at a path. */
  const field = (name: string) => ({
    name,
    value: draft[name] ?? '',
    error: errors[name],
    onChange: (event: ChangeEvent<HTMLInputElement | HTMLSelectElement>) =>
      set(name, event.target.value),
  });
  const check = (name: string) => ({
    name,
    checked: draft[name] === 'true',
    onChange: (event: ChangeEvent<HTMLInputElement>) => set(name, String(event.target.checked)),
  });
  return { draft, errors, set, setDraft, submit, field, check };
}
