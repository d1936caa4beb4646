import type { ComponentProps, ReactNode } from 'react';
import { TextField } from './text-field';

interface NumberFieldProps extends Omit<ComponentProps<typeof TextField>, 'type' | 'trailing'> {
  unit?: ReactNode;
}

/** A number with its unit inside the field; any number of decimals. */
export function NumberField({ unit, step = 'any', ...field }: NumberFieldProps) {
  return <TextField {...field} type="number" inputMode="decimal" step={step} trailing={unit} />;
}
