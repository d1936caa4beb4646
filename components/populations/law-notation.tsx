import { JupiterMass, ProportionalTo } from '@/components/ui/notation';
import { describePopulation } from '@/lib/inference';
import { fromLogIndex, type IndexConvention } from '@/lib/population';
import { formatPlain, formatRange, THIN_SPACE } from '@/lib/quantities/display';
import {
  isPlainPowerLaw,
  type ListedDefinition,
  type PowerLawDefinition,
} from '@/lib/schemas/populations';

/** An index with at most three decimals and a true minus sign. */
export function formatIndex(value: number): string {
  const rounded = Math.round(value * 1000) / 1000;
  return rounded === 0 ? '0' : formatPlain(rounded);
}

/** The stored index as the chosen convention quotes it. */
export function quoteIndex(logIndex: number, convention: IndexConvention): string {
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

/** dN/dM ∝ M^−1.3, in the convention that its left side names. */
export function PowerLaw({
  variable,
  definition,
  convention = 'linear',
}: {
  variable: keyof typeof variables;
  definition: PowerLawDefinition;
  convention?: IndexConvention;
}) {
  const { symbol, field } = variables[variable];
  return (
    <span className="whitespace-nowrap">
      d<i>N</i>/d{convention === 'log' && ' ln '}
      <i>{symbol}</i>
      <ProportionalTo />
      <i>{symbol}</i>
      <sup>{quoteIndex(definition[field], convention)}</sup>
    </span>
  );
}

/** Both laws, separated by a comma; what is not a plain power law in words. */
export function PowerLaws({
  definition,
  convention = 'linear',
}: {
  definition: ListedDefinition;
  convention?: IndexConvention;
}) {
  if (!isPlainPowerLaw(definition)) return <>{describePopulation(definition)}</>;
  return (
    <>
      <PowerLaw variable="mass" definition={definition} convention={convention} />
      {', '}
      <PowerLaw variable="semi-major axis" definition={definition} convention={convention} />
    </>
  );
}
