import type { ReactNode } from 'react';
import { Icon } from './icon';

export interface FieldTexts {
  label: ReactNode;
  /** What is wanted, under the field. */
  hint?: ReactNode;
  /** What was found and expected; takes the place of the hint. */
  error?: ReactNode;
  /** A link or word at the right end of the label's line. */
  aside?: ReactNode;
  /** The label is read but not seen. */
  isLabelHidden?: boolean;
}

export const inputLook =
  'w-full min-w-0 rounded border bg-surface px-3 text-ink placeholder:text-ink3 focus-visible:border-act focus-visible:outline-offset-0 disabled:border-dashed disabled:text-ink3';

export function inputEdge(error: ReactNode): string {
  return error ? 'border-bad' : 'border-rule2';
}

/** Points the field at its hint or error for a screen reader. */
export function describedBy(id: string, { hint, error }: FieldTexts): string | undefined {
  return error || hint ? `${id}-note` : undefined;
}

export function FieldFrame({
  id,
  label,
  hint,
  error,
  aside,
  isLabelHidden = false,
  children,
}: FieldTexts & { id: string; children: ReactNode }) {
  return (
    <div className="min-w-0">
      <div
        className={`mb-[5px] flex justify-between gap-3 text-ink2 text-note ${isLabelHidden ? 'sr-only' : ''}`}
      >
        <label htmlFor={id}>{label}</label>
        {aside}
      </div>
      {children}
      {(error || hint) && (
        <p
          id={`${id}-note`}
          className={`mt-1 text-note ${error ? 'flex gap-1.5 text-bad' : 'text-ink3'}`}
          role={error ? 'alert' : undefined}
        >
          {error ? <Icon name="bad" size={15} className="mt-0.5" /> : null}
          <span>{error || hint}</span>
        </p>
      )}
    </div>
  );
}
