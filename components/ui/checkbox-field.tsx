import { type InputHTMLAttributes, type ReactNode, type Ref, useId } from 'react';

interface CheckboxFieldProps
  extends Omit<InputHTMLAttributes<HTMLInputElement>, 'className' | 'type'> {
  label: ReactNode;
  hint?: ReactNode;
  ref?: Ref<HTMLInputElement>;
}

export function CheckboxField({ label, hint, ...input }: CheckboxFieldProps) {
  const ownId = useId();
  const id = input.id ?? ownId;
  return (
    <div className="flex gap-2.5 py-1 max-md:min-h-11 max-md:items-center">
      <input
        {...input}
        id={id}
        type="checkbox"
        className="checkbox mt-0.5"
        aria-describedby={hint ? `${id}-note` : undefined}
      />
      <div>
        <label htmlFor={id}>{label}</label>
        {hint && (
          <p id={`${id}-note`} className="text-ink3 text-note">
            {hint}
          </p>
        )}
      </div>
    </div>
  );
}
