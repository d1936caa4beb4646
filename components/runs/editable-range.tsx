'use client';

import { type FocusEvent, type KeyboardEvent, type ReactNode, useRef, useState } from 'react';

interface EditableRangeProps {
  /** "planet mass", for readers. */
  name: string;
  /** For readers, and as it is seen behind the fields. */
  unit: string;
  mark: ReactNode;
  min: number;
  max: number;
  /** Ends that make sense at all. */
  bounds: [number, number];
  /** How it reads while nobody edits it. */
  children: ReactNode;
  onChange(min: number, max: number): void;
}

/** A range inside a sentence: a press turns it into two fields; Enter takes them, Escape leaves. */
export function EditableRange(props: EditableRangeProps) {
  const { name, unit, mark, min, max, bounds, children, onChange } = props;
  const [isOpen, setOpen] = useState(false);
  const [fault, setFault] = useState<string>();
  const fields = useRef<HTMLSpanElement>(null);
  const button = useRef<HTMLButtonElement>(null);

  const close = () => {
    setOpen(false);
    setFault(undefined);
    requestAnimationFrame(() => button.current?.focus());
  };
  const take = () => {
    const [low, high] = [...(fields.current?.querySelectorAll('input') ?? [])].map((input) =>
      Number(input.value),
    );
    if (low === min && high === max) return close();
    if (!(low > 0 && high > low))
      return setFault('The first end must be positive and below the second.');
    if (low < bounds[0] || high > bounds[1]) {
      return setFault(`Both ends must lie within ${bounds[0]} to ${bounds[1]} ${unit}.`);
    }
    onChange(low, high);
    close();
  };
  const leave = (event: FocusEvent) => {
    if (!fields.current?.contains(event.relatedTarget)) take();
  };
  const press = (event: KeyboardEvent) => {
    if (event.key === 'Enter') take();
    if (event.key === 'Escape') close();
  };

  if (!isOpen) {
    return (
      <button
        ref={button}
        type="button"
        className="editable text-left"
        aria-label={`${name}, ${min} to ${max} ${unit}: change`}
        onClick={() => setOpen(true)}
      >
        {children}
      </button>
    );
  }
  const look =
    'w-[4.2em] [appearance:textfield] [&::-webkit-inner-spin-button]:appearance-none border-ink3 border-b-[1.5px] border-dashed bg-transparent px-0.5 text-center font-semibold text-ink';
  return (
    <span ref={fields} className="whitespace-nowrap">
      <input
        className={look}
        type="number"
        step="any"
        defaultValue={min}
        aria-label={`${name}, lower end, ${unit}`}
        onKeyDown={press}
        onBlur={leave}
        // biome-ignore lint/a11y/noAutofocus: the field takes the place of the button that was just pressed
        autoFocus
      />
      {' – '}
      <input
        className={look}
        type="number"
        step="any"
        defaultValue={max}
        aria-label={`${name}, upper end, ${unit}`}
        onKeyDown={press}
        onBlur={leave}
      />
      <span aria-hidden="true"> {mark}</span>
      {fault !== undefined && (
        <span role="alert" className="block whitespace-normal font-normal text-note text-ink2">
          {fault}
        </span>
      )}
    </span>
  );
}
