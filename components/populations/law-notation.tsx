import { FormulaWords } from '@/components/ui/formula-words';
import { JupiterMass, ProportionalTo } from '@/components/ui/notation';
import { describePopulation } from '@/lib/inference';
import { type AxisConvention, fromLogIndex } from '@/lib/population';
import { formatPlain, formatRange, THIN_SPACE } from '@/lib/quantities/display';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedDefinition } from '@/lib/schemas/populations';

/** An index with at most three decimals and a true minus sign. */
export function formatIndex(value: number): string {
  const rounded = Math.round(value * 1000) / 1000;
  return rounded === 0 ? '0' : formatPlain(rounded);
}

/** The stored index as the chosen convention quotes it. */
export function quoteIndex(logIndex: number, convention: AxisConvention): string {
  return formatIndex(fromLogIndex(logIndex, convention));
}

export function MassRange({ definition }: { definition: ListedDefinition }) {
  if (definition.form === 'mass-ratio') {
    const ratio = formatRange(definition.massRatioMin, definition.massRatioMax, '');
    return <span>{ratio} of the star’s mass</span>;
  }
  return (
    <span className="whitespace-nowrap">
      {formatRange(definition.massMinMjup, definition.massMaxMjup, '')}
      {THIN_SPACE}
      <JupiterMass />
    </span>
  );
}

export function AxisRange({ definition }: { definition: ListedDefinition }) {
  return (
    <span className="whitespace-nowrap">
      {formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, 'AU')}
    </span>
  );
}

const variables = {
  mass: { symbol: 'M', field: 'massIndex' },
  'semi-major axis': { symbol: 'a', field: 'semiMajorAxisIndex' },
} as const;

/** "dN/d ln M" and the variable that it follows, in a convention. */
export function Density({ symbol, convention }: { symbol: string; convention: AxisConvention }) {
  const isPeriod = convention === 'period' || convention === 'linear-period';
  const isLog = convention === 'log' || convention === 'period';
  return (
    <>
      d<i>N</i>/d{isLog && ' ln '}
      {convention === 'log10' && (
        <>
          {' '}
          log<sub>10</sub>{' '}
        </>
      )}
      <i>{isPeriod ? 'P' : symbol}</i>
    </>
  );
}

/** dN/dM ∝ M^−1.3, in the convention that its left side names. */
export function PowerOf({
  symbol,
  index,
  convention = 'linear',
}: {
  symbol: string;
  /** As stored, per natural logarithm. */
  index: number;
  convention?: AxisConvention;
}) {
  const isPeriod = convention === 'period' || convention === 'linear-period';
  return (
    <span className="whitespace-nowrap">
      <Density symbol={symbol} convention={convention} />
      <ProportionalTo />
      <i>{isPeriod ? 'P' : symbol}</i>
      <sup>{quoteIndex(index, convention)}</sup>
    </span>
  );
}

/** Both laws, separated by a comma; what is not a plain power law in words. */
export function PowerLaws({ definition }: { definition: ListedDefinition }) {
  if (!isPlainPowerLaw(definition)) return <FormulaWords text={describePopulation(definition)} />;
  return (
    <>
      {(['mass', 'semi-major axis'] as const).map((variable) => (
        <span key={variable}>
          {variable === 'semi-major axis' && ', '}
          <PowerOf
            symbol={variables[variable].symbol}
            index={definition[variables[variable].field]}
          />
        </span>
      ))}
    </>
  );
}
