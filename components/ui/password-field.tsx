'use client';

import { type InputHTMLAttributes, type Ref, useId, useState } from 'react';
import { describedBy, FieldFrame, type FieldTexts, inputEdge, inputLook } from './field-frame';

interface PasswordFieldProps
  extends FieldTexts,
    Omit<InputHTMLAttributes<HTMLInputElement>, 'className' | 'type'> {
  ref?: Ref<HTMLInputElement>;
}

export function PasswordField({
  label,
  hint,
  error,
  aside,
  isLabelHidden,
  ...input
}: PasswordFieldProps) {
  const ownId = useId();
  const id = input.id ?? ownId;
  const [isShown, setShown] = useState(false);
  const texts = { label, hint, error, aside, isLabelHidden };
  return (
    <FieldFrame id={id} {...texts}>
      <div className="relative">
        <input
          {...input}
          id={id}
          type={isShown ? 'text' : 'password'}
          className={`h-9 pr-16 max-md:h-11 ${inputLook} ${inputEdge(error)}`}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, texts)}
        />
        <button
          type="button"
          className="absolute inset-y-0 right-0 min-w-11 rounded px-3 text-act text-note"
          aria-pressed={isShown}
          aria-controls={id}
          onClick={() => setShown(!isShown)}
        >
          {isShown ? 'Hide' : 'Show'}
          <span className="sr-only"> the password</span>
        </button>
      </div>
    </FieldFrame>
  );
}
