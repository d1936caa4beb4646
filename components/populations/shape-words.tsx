import type { ReactNode } from 'react';
import { JupiterMass, ProportionalTo } from '@/components/ui/notation';
import { type AxisConvention, type AxisShape, hostScalingOf } from '@/lib/population';
import { formatPlain, formatRange, THIN_SPACE } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { Conventions } from './builder-setting';
import { PowerLaws, PowerOf, quoteIndex } from './law-notation';
import { type LawAxis, type LawParts, partsOf } from './law-parts';

/** Letter and unit of an axis: mass, mass ratio or semi-major axis. */
export function axisNotation(axis: LawAxis, isRatio: boolean) {
  if (axis === 'semiMajorAxis') return { symbol: 'a', unit: 'AU', unitWords: 'AU' };
  return isRatio
    ? { symbol: 'q', unit: '', unitWords: 'times the mass of the star' }
    : { symbol: 'M', unit: 'MJ', unitWords: 'Jupiter masses' };
}

/** A number with the unit of its axis; a mass ratio has none. */
export function WithUnit({ unit, children }: { unit: string; children: ReactNode }) {
  return (
    <span className="whitespace-nowrap">
      {children}
      {unit !== '' && THIN_SPACE}
      {unit === 'MJ' ? <JupiterMass /> : unit}
    </span>
  );
}

interface ShapeWordsProps {
  axis: LawAxis;
  isRatio: boolean;
  shape: AxisShape;
  convention?: AxisConvention;
}

/** The law along one axis, without its range. */
export function ShapeWords({ axis, isRatio, shape, convention = 'linear' }: ShapeWordsProps) {
  const { symbol, unit } = axisNotation(axis, isRatio);
  const isPeriod = convention === 'period' || convention === 'linear-period';
  switch (shape.shape) {
    case 'power-law':
      return <PowerOf symbol={symbol} index={shape.index} convention={convention} />;
    case 'broken-power-law':
      return (
        <>
          <PowerOf symbol={symbol} index={shape.innerIndex} convention={convention} /> below{' '}
          <WithUnit unit={unit}>{formatPlain(shape.breakAt)}</WithUnit> and{' '}
          <span className="whitespace-nowrap">
            <i>{isPeriod ? 'P' : symbol}</i>
            <sup>{quoteIndex(shape.outerIndex, convention)}</sup>
          </span>{' '}
          above
        </>
      );
    case 'log-normal':
      return (
        <>
          <i>{symbol}</i> log-normal around{' '}
          <WithUnit unit={unit}>{formatPlain(shape.median)}</WithUnit>, σ{' '}
          <WithUnit unit="dex">{formatPlain(shape.sigmaDex)}</WithUnit>
        </>
      );
    case 'tabulated':
      return (
        <>
          <i>{symbol}</i> from a table of {shape.at.length} places
        </>
      );
  }
}

export function RangeWords({ axis, parts }: { axis: LawAxis; parts: LawParts }) {
  const { range } = parts[axis];
  const { unit } = axisNotation(axis, parts.isRatio);
  return <WithUnit unit={unit}>{formatRange(range[0], range[1], '')}</WithUnit>;
}

/** rate ∝ (host mass/1 solar mass)^1 */
export function ScalingWords({ index, referenceMsun }: { index: number; referenceMsun: number }) {
  return (
    <span>
      rate
      <ProportionalTo />
      (host mass/{formatPlain(referenceMsun)} solar mass{referenceMsun === 1 ? '' : 'es'})
      <sup>{formatPlain(index)}</sup>
    </span>
  );
}

/** Every law of a population without the ranges, for a column beside them. */
export function LawsAlone({
  definition,
  conventions = { mass: 'linear', semiMajorAxis: 'linear' },
}: {
  definition: ListedDefinition;
  conventions?: Conventions;
}) {
  if (definition.form === 'systems') return <PowerLaws definition={definition} />;
  const parts = partsOf(definition);
  const scaling = hostScalingOf(definition);
  return (
    <>
      {(['mass', 'semiMajorAxis'] as const).map((axis) => (
        <span key={axis}>
          {axis === 'semiMajorAxis' && ', '}
          <ShapeWords
            axis={axis}
            isRatio={axis === 'mass' && parts.isRatio}
            shape={parts[axis].shape}
            convention={conventions[axis]}
          />
        </span>
      ))}
      {scaling && (
        <>
          , <ScalingWords {...scaling} />
        </>
      )}
    </>
  );
}
