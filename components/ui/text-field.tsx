import { type InputHTMLAttributes, type ReactNode, type Ref, useId } from 'react';
import { describedBy, FieldFrame, type FieldTexts, inputEdge, inputLook } from './field-frame';

interface TextFieldProps
  extends FieldTexts,
    Omit<InputHTMLAttributes<HTMLInputElement>, 'className'> {
  /** Inside the field at its right end, such as a unit. */
  trailing?: ReactNode;
  ref?: Ref<HTMLInputElement>;
}

/** Takes what a form library registers (name, ref, onChange, onBlur) as it is. */
export function TextField({
  label,
  hint,
  error,
  aside,
  isLabelHidden,
  trailing,
  type = 'text',
  ...input
}: TextFieldProps) {
  const ownId = useId();
  const id = input.id ?? ownId;
  const texts = { label, hint, error, aside, isLabelHidden };
  return (
    <FieldFrame id={id} {...texts}>
      <div className="relative">
        <input
          {...input}
          id={id}
          type={type}
          className={`h-9 max-md:h-11 ${inputLook} ${inputEdge(error)} ${trailing ? 'pr-14' : ''}`}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, texts)}
        />
        {trailing !== undefined && (
          <span className="absolute inset-y-0 right-3 flex items-center text-ink3 text-note">
            {trailing}
          </span>
        )}
      </div>
    </FieldFrame>
  );
}
