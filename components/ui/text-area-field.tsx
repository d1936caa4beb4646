import { type Ref, type TextareaHTMLAttributes, useId } from 'react';
import { describedBy, FieldFrame, type FieldTexts, inputEdge, inputLook } from './field-frame';

interface TextAreaFieldProps
  extends FieldTexts,
    Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'className'> {
  ref?: Ref<HTMLTextAreaElement>;
}

export function TextAreaField({
  label,
  hint,
  error,
  aside,
  isLabelHidden,
  rows = 3,
  ...area
}: TextAreaFieldProps) {
  const ownId = useId();
  const id = area.id ?? ownId;
  const texts = { label, hint, error, aside, isLabelHidden };
  return (
    <FieldFrame id={id} {...texts}>
      <textarea
        {...area}
        id={id}
        rows={rows}
        className={`block py-2 ${inputLook} ${inputEdge(error)}`}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id, texts)}
      />
    </FieldFrame>
  );
}
