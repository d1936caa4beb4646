'use client';

import type { Likelihood, RatePrior } from '@/lib/inference';
import { NumberEntry } from './number-entry';

interface PriorNumbersProps {
  prior: RatePrior;
  likelihood: Likelihood;
  onChange(prior: RatePrior): void;
}

/** The numbers of a prior's law, one field each; a law without numbers has none. */
export function PriorNumbers({ prior, likelihood, onChange }: PriorNumbersProps) {
  return (
    <>
      {fieldsOf(prior, likelihood).map((field) => (
        <NumberEntry
          key={`${prior.law} ${field.name}`}
          label={field.label}
          hint={field.hint}
          value={field.value}
          isAllowed={(value) => value > 0 && value <= (field.max ?? Number.POSITIVE_INFINITY)}
          expected={
            field.max === undefined ? 'A number above 0.' : `Above 0, at most ${field.max}.`
          }
          onValue={(value) => onChange(field.put(value))}
        />
      ))}
    </>
  );
}

interface PriorField {
  name: string;
  label: string;
  hint?: string;
  max?: number;
  value: number;
  put(value: number): RatePrior;
}

function fieldsOf(prior: RatePrior, likelihood: Likelihood): PriorField[] {
  const isFraction = likelihood === 'host-fraction';
  const largest = isFraction ? 1 : 1000;
  const unit = isFraction ? 'Fraction of stars.' : 'Planets per star.';
  const upTo = (value: number, put: (max: number) => RatePrior): PriorField => ({
    name: 'max',
    label: 'Largest rate',
    hint: unit,
    max: largest,
    value,
    put,
  });
  switch (prior.law) {
    case 'uniform':
      return [upTo(prior.max, (max) => ({ ...prior, max }))];
    case 'log-uniform':
      return [
        {
          name: 'min',
          label: 'Floor',
          hint: `${unit} With no detection the limit follows it.`,
          max: prior.max,
          value: prior.min,
          put: (min) => ({ ...prior, min }),
        },
        upTo(prior.max, (max) => ({ ...prior, max })),
      ];
    case 'jeffreys':
      return prior.max === undefined ? [] : [upTo(prior.max, (max) => ({ ...prior, max }))];
    case 'gamma':
      return [
        {
          name: 'shape',
          label: 'Shape',
          value: prior.shape,
          put: (shape) => ({ ...prior, shape }),
        },
        {
          name: 'rate',
          label: 'Rate, stars',
          value: prior.rate,
          put: (rate) => ({ ...prior, rate }),
        },
      ];
    case 'beta':
      return [
        { name: 'a', label: 'a', value: prior.a, put: (a) => ({ ...prior, a }) },
        { name: 'b', label: 'b', value: prior.b, put: (b) => ({ ...prior, b }) },
      ];
    case 'tabulated':
      return [];
  }
}
