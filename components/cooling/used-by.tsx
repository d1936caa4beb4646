import { Link } from '@/components/ui/link';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatPlain } from '@/lib/quantities/display';
import type { CoolingRelationView } from '@/lib/schemas/cooling';

export function startWords({
  startCondition,
}: Pick<CoolingRelationView, 'startCondition'>): string {
  return startCondition === 'unstated' ? 'start not stated' : `${startCondition} start`;
}

const SHOWN = 6;

/** "HD 1 (3 to 8 Myr), HD 2 (9 Myr) and 4 more". */
export function outsideWords(outside: CoolingRelationView['usedBy'][number]['outside']): string {
  const words = outside
    .slice(0, SHOWN)
    .map(({ name, lowerMyr, upperMyr }) =>
      lowerMyr === upperMyr
        ? `${name} (${formatPlain(lowerMyr, 3)} Myr)`
        : `${name} (${formatPlain(lowerMyr, 3)} to ${formatPlain(upperMyr, 3)} Myr)`,
    )
    .join(', ');
  return outside.length > SHOWN ? `${words} and ${outside.length - SHOWN} more` : words;
}

interface UsedByProps {
  collaboration: string;
  relation: CoolingRelationView;
}

/** The surveys whose maps rest on a relation, and their targets that it does not cover. */
export function UsedBy({ collaboration, relation }: UsedByProps) {
  const { usedBy, ageMyr } = relation;
  if (usedBy.length === 0) return <p className="text-ink2">No survey uses it.</p>;
  return (
    <Table caption={`Surveys that use ${relation.name}`}>
      <TableHead>
        <tr>
          <HeadCell>survey</HeadCell>
          <HeadCell isNumeric>targets with a curve</HeadCell>
          <HeadCell isNumeric>outside</HeadCell>
          <HeadCell>
            age beyond {formatPlain(ageMyr[0], 3)} to {formatPlain(ageMyr[ageMyr.length - 1], 3)}{' '}
            Myr, 68 %
          </HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {usedBy.map(({ slug, name, targets, outside }) => (
          <Row key={slug}>
            <Cell isRowHead className="whitespace-nowrap">
              <Link href={`/${collaboration}/surveys/${slug}`} className="text-ink">
                {name}
              </Link>
            </Cell>
            <Cell isNumeric>{targets}</Cell>
            <Cell isNumeric>{outside.length}</Cell>
            <Cell className="min-w-48">{outsideWords(outside) || '–'}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
