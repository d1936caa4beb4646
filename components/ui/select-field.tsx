import { type Ref, type SelectHTMLAttributes, useId } from 'react';
import { describedBy, FieldFrame, type FieldTexts, inputEdge, inputLook } from './field-frame';
import { Icon } from './icon';

interface SelectFieldProps
  extends FieldTexts,
    Omit<SelectHTMLAttributes<HTMLSelectElement>, 'className'> {
  options: { value: string; label: string; isDisabled?: boolean }[];
  ref?: Ref<HTMLSelectElement>;
}

export function SelectField({
  label,
  hint,
  error,
  aside,
  isLabelHidden,
  options,
  ...select
}: SelectFieldProps) {
  const ownId = useId();
  const id = select.id ?? ownId;
  const texts = { label, hint, error, aside, isLabelHidden };
  return (
    <FieldFrame id={id} {...texts}>
      <div className="relative">
        <select
          {...select}
          id={id}
          className={`h-9 appearance-none pr-9 max-md:h-11 ${inputLook} ${inputEdge(error)}`}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy(id, texts)}
        >
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.isDisabled}>
              {option.label}
            </option>
          ))}
        </select>
        <Icon
          name="down"
          size={14}
          className="pointer-events-none absolute top-1/2 right-3 -translate-y-1/2"
        />
      </div>
    </FieldFrame>
  );
}
