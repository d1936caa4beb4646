'use client';

import { type ReactNode, useId } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';

export interface SwitchOption<Value extends string> {
  value: Value;
  label: ReactNode;
  /**
   * What choosing it would give, in the unit that stands beside the switch: "6.6". While it is
   * being computed its place is kept, so that nothing moves when it comes.
   */
  consequence?: string | 'pending';
  /** Why it cannot be chosen. */
  disabledReason?: string;
}

interface ConsequenceSwitchProps<Value extends string> {
  label: ReactNode;
  options: SwitchOption<Value>[];
  value: Value;
  onChange(value: Value): void;
  isLabelHidden?: boolean;
  size?: 'normal' | 'small';
  /** Options share the whole width, as on a narrow screen. */
  isWide?: boolean;
  /** The word that a mark behind the label explains. */
  help?: HelpWord;
}

/** Options in a row; each carries the consequence of choosing it. Real radio buttons beneath. */
export function ConsequenceSwitch<Value extends string>({
  label,
  options,
  value,
  onChange,
  isLabelHidden = false,
  size = 'normal',
  isWide = false,
  help,
}: ConsequenceSwitchProps<Value>) {
  const name = useId();
  const labelId = useId();
  return (
    <fieldset
      aria-labelledby={help === undefined ? undefined : labelId}
      className={`min-w-0 ${isWide ? 'w-full' : 'max-md:w-full'}`}
    >
      <legend className={isLabelHidden ? 'sr-only' : 'mb-1 text-ink2 text-note'}>
        <span id={labelId}>{label}</span>
        {help !== undefined && <HelpMark word={help} />}
      </legend>
      <div
        className={`rounded border border-rule2 bg-surface text-note ${isWide ? 'flex' : 'flex w-full md:inline-flex md:w-auto'}`}
      >
        {options.map((option, index) => {
          const isChosen = option.value === value;
          const isRefused = option.disabledReason !== undefined;
          return (
            <label
              key={option.value}
              title={option.disabledReason}
              className={`relative flex items-center justify-center gap-2 leading-[1.35] first:rounded-l-[2px] last:rounded-r-[2px] focus-within:z-10 has-[:focus-visible]:outline-2 has-[:focus-visible]:outline-act has-[:focus-visible]:outline-offset-2 max-md:min-h-11 max-md:flex-1 max-md:text-center ${
                isWide ? 'flex-1' : ''
              } ${size === 'small' ? 'px-[9px] py-0.5 text-chart' : 'px-[11px] py-1'} ${
                index > 0 ? 'border-rule border-l' : ''
              } ${isChosen ? 'bg-ink font-semibold text-page' : 'text-ink2'} ${
                isRefused ? 'cursor-not-allowed border-dashed text-ink3' : ''
              }`}
            >
              <input
                type="radio"
                className="absolute inset-0 cursor-pointer appearance-none opacity-0"
                name={name}
                value={option.value}
                checked={isChosen}
                disabled={isRefused}
                onChange={() => onChange(option.value)}
              />
              <span className="md:whitespace-nowrap">{option.label}</span>
              {option.consequence === 'pending' ? (
                <span className="invisible font-semibold" aria-hidden="true">
                  0.0
                </span>
              ) : (
                option.consequence !== undefined && (
                  <span className={`font-semibold ${isChosen ? 'text-page' : 'text-bound'}`}>
                    <span className="sr-only">gives </span>
                    {option.consequence}
                  </span>
                )
              )}
            </label>
          );
        })}
      </div>
    </fieldset>
  );
}
