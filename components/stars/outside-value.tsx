'use client';

import { useState } from 'react';
import { NumberField } from '@/components/ui/number-field';
import { TextField } from '@/components/ui/text-field';
import {
  type AdoptedQuantity,
  type AdoptionChoices,
  previewAdoptionSchema,
  type StarView,
} from '@/lib/schemas/stars';
import { AdoptDialog } from './adopt-dialog';

const numberOf = (text: string) => (text.trim() === '' ? null : Number(text));

/** A value with its errors as the API takes it; errors are distances from the value. */
function statedValue(
  quantity: AdoptedQuantity,
  value: number,
  below: number | null,
  above: number | null,
) {
  if (quantity === 'distance') return { distancePc: value, distanceErrorPc: below };
  return {
    ageMyr: value,
    ageLowerMyr: below === null ? null : value - below,
    ageUpperMyr: above === null ? null : value + above,
  };
}

interface OutsideValueProps {
  collaboration: string;
  star: Pick<StarView, 'id' | 'name'>;
  quantity: AdoptedQuantity;
  onClose(): void;
  onAdopted(): void;
}

/** Adopts a value that none of the surveys states, with where it comes from. */
export function OutsideValue(props: OutsideValueProps) {
  const { collaboration, star, quantity, onClose, onAdopted } = props;
  const [value, setValue] = useState('');
  const [below, setBelow] = useState('');
  const [above, setAbove] = useState('');
  const [source, setSource] = useState('');
  const isAge = quantity === 'age';
  const middle = numberOf(value);
  const checked =
    middle === null || source.trim() === ''
      ? null
      : previewAdoptionSchema.safeParse({
          quantity,
          choices: [
            {
              starId: star.id,
              choice: {
                kind: 'value',
                value: statedValue(
                  quantity,
                  middle,
                  numberOf(below),
                  numberOf(isAge ? above : below),
                ),
                source: source.trim(),
              },
            },
          ],
        });
  const choices: AdoptionChoices | null = checked?.success ? checked.data : null;
  const missing =
    middle === null
      ? `Enter the ${quantity}`
      : source.trim() === ''
        ? 'Say where it comes from'
        : 'Errors lie around the value, and nothing is negative';
  return (
    <AdoptDialog
      collaboration={collaboration}
      title={`Another ${quantity} of ${star.name}`}
      choices={choices}
      missing={missing}
      onClose={onClose}
      onAdopted={onAdopted}
    >
      <div className={`grid gap-3 ${isAge ? 'sm:grid-cols-3' : 'sm:grid-cols-2'}`}>
        <NumberField
          label={isAge ? 'Age' : 'Distance'}
          unit={isAge ? 'Myr' : 'pc'}
          min={0}
          value={value}
          onChange={(event) => setValue(event.target.value)}
        />
        <NumberField
          label={isAge ? 'Error below' : 'Error'}
          hint="1 σ"
          unit={isAge ? 'Myr' : 'pc'}
          min={0}
          value={below}
          onChange={(event) => setBelow(event.target.value)}
        />
        {isAge && (
          <NumberField
            label="Error above"
            hint="1 σ"
            unit="Myr"
            min={0}
            value={above}
            onChange={(event) => setAbove(event.target.value)}
          />
        )}
      </div>
      <TextField
        label="Source"
        hint="a paper, a catalogue, a method"
        value={source}
        maxLength={200}
        onChange={(event) => setSource(event.target.value)}
      />
    </AdoptDialog>
  );
}
