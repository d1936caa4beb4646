import type { CornerParameter } from '@/components/charts/corner-chart';
import type { JointPlane } from '@/components/charts/joint-contours';
import { fromLogIndex, type IndexConvention } from '@/lib/population';
import { formatRate, rateUnit } from '@/lib/quantities/display';
import type { AnswerProps } from '../kind-entry';
import { indexOfPosterior } from './free-indices-words';

type Answer = AnswerProps<'free-indices'>;
type Parameter = Answer['result']['massIndex'];

/** Each parameter as it is quoted: indices in a convention, the rate per 100 stars. */
export function cornerParameters(
  { asked, result }: Pick<Answer, 'asked' | 'result'>,
  convention: IndexConvention,
): [CornerParameter, CornerParameter, CornerParameter] {
  const { definition, quantity } = asked;
  const own = definition?.form === 'power-law' ? definition : undefined;
  const index = (
    key: string,
    symbol: string,
    variable: string,
    plainName: string,
    parameter: Parameter,
    fixed: number | undefined,
  ): CornerParameter => {
    const quote = (stored: number) => fromLogIndex(stored, convention);
    return {
      ...quotedParameter(parameter, quote),
      key,
      plainName,
      name: (
        <>
          <tspan fontStyle="italic">{symbol}</tspan> of d<tspan fontStyle="italic">N</tspan>/d
          {convention === 'log' ? ' ln ' : ''}
          <tspan fontStyle="italic">{variable}</tspan>
        </>
      ),
      fixed: fixed === undefined ? undefined : quote(fixed),
      say: (value) => `${symbol} = ${indexOfPosterior(value)}`,
    };
  };
  return [
    index('mass', 'α', 'M', 'mass index', result.massIndex, own?.massIndex),
    index(
      'axis',
      'β',
      'a',
      'semi-major-axis index',
      result.semiMajorAxisIndex,
      own?.semiMajorAxisIndex,
    ),
    {
      ...quotedParameter(result.rate, (rate) => 100 * rate),
      key: 'rate',
      plainName: quantity === 'host_fraction' ? 'host fraction' : 'rate',
      name: quantity === 'host_fraction' ? 'host fraction, %' : rateUnit(quantity),
      say: (percentage) => formatRate(percentage / 100, quantity),
    },
  ];
}

/** All values moved by the same rule; densities keep their shape, which is what is drawn. */
function quotedParameter(parameter: Parameter, quote: (value: number) => number) {
  const pair = ([low, high]: [number, number]): [number, number] => [quote(low), quote(high)];
  return {
    value: parameter.marginal.value.map(quote),
    density: parameter.marginal.density,
    median: quote(parameter.median),
    interval68: pair(parameter.interval68),
    interval95: pair(parameter.interval95),
  };
}

/** β over α, rate over α, rate over β: the cells below the diagonal. */
export function cornerPlanes(
  { result }: Pick<Answer, 'result'>,
  convention: IndexConvention,
): [JointPlane, JointPlane, JointPlane] {
  const quote = (stored: number) => fromLogIndex(stored, convention);
  const percent = (rate: number) => 100 * rate;
  const placed = (
    plane: JointPlane,
    x: (value: number) => number,
    y: (value: number) => number,
  ): JointPlane => ({ x: plane.x.map(x), y: plane.y.map(y), density: plane.density });
  return [
    placed(result.massIndexBySemiMajorAxisIndex, quote, quote),
    placed(result.rateByMassIndex, quote, percent),
    placed(result.rateBySemiMajorAxisIndex, quote, percent),
  ];
}
