import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import type { CombinationView } from '@/lib/schemas/combinations';

interface CombinationTableProps {
  combinations: CombinationView[];
  openId?: string;
  onOpen(combination: CombinationView): void;
}

/** Every version of every combination. */
export function CombinationTable({ combinations, openId, onOpen }: CombinationTableProps) {
  if (combinations.length === 0) {
    return (
      <p className="text-ink2">
        None yet. Without one, an analysis takes the surveys that it names in the order in which
        they were added.
      </p>
    );
  }
  return (
    <Table caption="Saved combinations, every version">
      <TableHead>
        <tr>
          <HeadCell>combination</HeadCell>
          <HeadCell>in words</HeadCell>
          <HeadCell className="max-md:hidden">used by</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {combinations.map((combination) => (
          <Row key={combination.id} isSelected={combination.id === openId}>
            <Cell isRowHead className="whitespace-nowrap">
              <TextAction onClick={() => onOpen(combination)}>{combination.name}</TextAction>
              <span className="block font-normal text-chart text-ink3">
                {combination.key}, version {combination.version}
              </span>
            </Cell>
            <Cell className="min-w-56">{combination.words}</Cell>
            <Cell className="max-md:hidden">{combination.usedBy.join(', ') || '–'}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
