import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import type { SampleView } from '@/lib/schemas/samples';

interface SampleTableProps {
  samples: SampleView[];
  openId?: string;
  onOpen(sample: SampleView): void;
}

/** Every version of every sample; a version is opened to be looked at or to begin the next. */
export function SampleTable({ samples, openId, onOpen }: SampleTableProps) {
  return (
    <Table caption="Saved samples, every version">
      <TableHead>
        <tr>
          <HeadCell>sample</HeadCell>
          <HeadCell>in words</HeadCell>
          <HeadCell className="max-md:hidden">used by</HeadCell>
          <HeadCell className="max-lg:hidden">by</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {samples.map((sample) => (
          <Row key={sample.id} isSelected={sample.id === openId}>
            <Cell isRowHead className="whitespace-nowrap">
              <TextAction onClick={() => onOpen(sample)}>{sample.name}</TextAction>
              <span className="block font-normal text-chart text-ink3">
                {sample.key}, version {sample.version}
              </span>
            </Cell>
            <Cell className="min-w-56">{sample.words}</Cell>
            <Cell className="max-md:hidden">{sample.usedBy.join(', ') || '–'}</Cell>
            <Cell className="max-lg:hidden">{sample.createdBy ?? '–'}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
