'use client';

import { useState } from 'react';
import { TextAreaField } from '@/components/ui/text-area-field';
import type { TabulatedShape } from '@/lib/population';
import { readColumns, writeColumns } from './read-columns';

interface OwnDistributionProps {
  /** "Planet mass". */
  name: string;
  /** "M in MJ" and "ln M": what the two columns hold. */
  place: string;
  perLog: string;
  shape: TabulatedShape;
  onShape(shape: TabulatedShape): void;
}

/** Two columns of one's own; half-typed ones stay in the field and change nothing yet. */
export function OwnDistribution({ name, place, perLog, shape, onShape }: OwnDistributionProps) {
  const [text, setText] = useState(() => writeColumns(shape));
  const [known, setKnown] = useState(shape);
  if (known !== shape) {
    setKnown(shape);
    const read = readColumns(text);
    if (!('shape' in read) || JSON.stringify(read.shape) !== JSON.stringify(shape)) {
      setText(writeColumns(shape));
    }
  }
  const read = readColumns(text);
  return (
    <TextAreaField
      label={`${name}: ${place}, and density per ${perLog}`}
      hint="Two columns, a line a place. The scale is free; between places it is linear in the logarithm, outside them 0."
      error={'fault' in read ? read.fault : undefined}
      rows={7}
      spellCheck={false}
      value={text}
      onChange={(event) => {
        setText(event.target.value);
        const next = readColumns(event.target.value);
        if ('shape' in next) {
          onShape(next.shape);
        }
      }}
    />
  );
}
