'use client';

import type { ReactNode } from 'react';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { type AxisConvention, type AxisShape, indicesOf } from '@/lib/population';
import { formatIndex } from './law-notation';
import type { LawAxis } from './law-parts';

interface ConventionChoiceProps {
  axis: LawAxis;
  symbol: string;
  shape: AxisShape;
  convention: AxisConvention;
  onChange(convention: AxisConvention): void;
}

/** What the indices of an axis are stated per, and what is stored of them. */
export function ConventionChoice(props: ConventionChoiceProps) {
  const { axis, symbol, shape, convention, onChange } = props;
  const options: { value: AxisConvention; label: ReactNode }[] = [
    { value: 'linear', label: <Per symbol={symbol} /> },
    { value: 'log', label: <Per symbol={symbol} log="ln" /> },
    {
      value: 'log10',
      label: (
        <Per
          symbol={symbol}
          log={
            <>
              log<sub>10</sub>
            </>
          }
        />
      ),
    },
  ];
  if (axis === 'semiMajorAxis') {
    options.push(
      { value: 'period', label: <Per symbol="P" log="ln" /> },
      { value: 'linear-period', label: <Per symbol="P" /> },
    );
  }
  const indices = indicesOf(shape);
  return (
    <div className="mb-2.5 flex flex-wrap items-center gap-x-3 gap-y-1">
      <ConsequenceSwitch
        help="index-convention"
        label={`What the index of ${axis === 'mass' ? 'the mass' : 'the semi-major axis'} is stated per`}
        isLabelHidden
        size="small"
        value={convention}
        options={options}
        onChange={onChange}
      />
      <p className="text-chart text-ink3">
        stored per ln <i>{symbol}</i>:{' '}
        <b className="text-ink2">{indices.map(({ index }) => formatIndex(index)).join(' and ')}</b>
      </p>
    </div>
  );
}

function Per({ symbol, log }: { symbol: string; log?: ReactNode }) {
  return (
    <span className="whitespace-nowrap">
      per {log !== undefined && <>{log} </>}
      <i>{symbol}</i>
    </span>
  );
}
