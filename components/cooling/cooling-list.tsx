import { JupiterMass } from '@/components/ui/notation';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { formatPlain } from '@/lib/quantities/display';
import type { CoolingTableView } from '@/lib/schemas/surveys';
import { BUILT_IN_LAW_BANDS, BUILT_IN_LAW_NAME, BUILT_IN_LAW_RANGE } from '@/lib/sensitivity';
import { startWords } from './used-by';

interface CoolingListProps {
  tables: CoolingTableView[];
  shownId: string;
  builtInId: string;
  onShow(id: string): void;
}

interface Line {
  id: string;
  name: string;
  bands: readonly string[];
  masses: [number, number];
  ages: [number, number];
  start: string;
}

const ends = (axis: readonly number[]): [number, number] => [axis[0], axis[axis.length - 1]];
const rangeWords = ([low, high]: [number, number]) =>
  `${formatPlain(low, 3)}–${formatPlain(high, 3)}`;

/** Every relation with its bands and ranges; the built-in law is labelled as approximate. */
export function CoolingList({ tables, shownId, builtInId, onShow }: CoolingListProps) {
  const { massMinMjup, massMaxMjup, ageMinMyr, ageMaxMyr } = BUILT_IN_LAW_RANGE;
  const lines: Line[] = [
    ...tables.map((table) => ({
      id: table.id,
      name: table.name,
      bands: table.bands,
      masses: ends(table.massMjup),
      ages: ends(table.ageMyr),
      start: startWords(table),
    })),
    {
      id: builtInId,
      name: `${BUILT_IN_LAW_NAME} (built in)`,
      bands: BUILT_IN_LAW_BANDS,
      masses: [massMinMjup, massMaxMjup],
      ages: [ageMinMyr, ageMaxMyr],
      start: startWords({ startCondition: 'hot' }),
    },
  ];
  return (
    <Table caption="Cooling relations">
      <TableHead>
        <tr>
          <HeadCell>relation</HeadCell>
          <HeadCell>bands</HeadCell>
          <HeadCell isNumeric>
            masses, <JupiterMass />
          </HeadCell>
          <HeadCell isNumeric>ages, Myr</HeadCell>
          <HeadCell>start</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {lines.map((line) => (
          <Row key={line.id} isSelected={line.id === shownId}>
            <Cell isRowHead>
              <TextAction onClick={() => onShow(line.id)}>{line.name}</TextAction>
            </Cell>
            <Cell>{line.bands.join(', ')}</Cell>
            <Cell isNumeric>{rangeWords(line.masses)}</Cell>
            <Cell isNumeric>{rangeWords(line.ages)}</Cell>
            <Cell className="whitespace-nowrap">{line.start}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
