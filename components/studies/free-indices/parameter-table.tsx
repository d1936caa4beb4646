import type { CornerParameter } from '@/components/charts/corner-chart';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { fromLogIndex, type IndexConvention } from '@/lib/population';
import { formatSignificant } from '@/lib/quantities/display';
import type { AnswerProps } from '../kind-entry';
import { indexOfPosterior } from './free-indices-words';

interface ParameterTableProps {
  result: AnswerProps<'free-indices'>['result'];
  parameters: CornerParameter[];
  convention: IndexConvention;
}

/** Mean, median and intervals of each parameter, as the drawing quotes them. */
export function ParameterTable({ result, parameters, convention }: ParameterTableProps) {
  const means = [
    fromLogIndex(result.massIndex.mean, convention),
    fromLogIndex(result.semiMajorAxisIndex.mean, convention),
    100 * result.rate.mean,
  ];
  const spreads = [
    result.massIndex.standardDeviation,
    result.semiMajorAxisIndex.standardDeviation,
    100 * result.rate.standardDeviation,
  ];
  return (
    <Table caption="Mean, median and intervals of each parameter">
      <TableHead>
        <tr>
          <HeadCell>parameter</HeadCell>
          <HeadCell isNumeric>mean</HeadCell>
          <HeadCell isNumeric>median</HeadCell>
          <HeadCell isNumeric>68{'\u2009'}%</HeadCell>
          <HeadCell isNumeric>95{'\u2009'}%</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {parameters.map((one, index) => {
          const number = (value: number) =>
            one.key === 'rate' ? rounded(value, spreads[index]) : indexOfPosterior(value);
          const range = ([low, high]: [number, number]) => `${number(low)} to ${number(high)}`;
          return (
            <Row key={one.key}>
              <Cell isRowHead>
                {one.key === 'rate' ? `${one.plainName}, %` : one.say(0).slice(0, 1)}
              </Cell>
              <Cell isNumeric>{number(means[index])}</Cell>
              <Cell isNumeric>{number(one.median)}</Cell>
              <Cell isNumeric className="max-md:whitespace-normal">
                {range(one.interval68)}
              </Cell>
              <Cell isNumeric className="max-md:whitespace-normal">
                {range(one.interval95)}
              </Cell>
            </Row>
          );
        })}
      </TableBody>
    </Table>
  );
}

/** To a hundredth of the spread at most: more digits say nothing. */
function rounded(value: number, spread: number): string {
  const decimals = Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(spread))));
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? formatSignificant(0, 1) : text.replace('-', '\u2212');
}
