import { Link } from '@/components/ui/link';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { GuideField } from '@/lib/schemas/api-guide';

interface FieldTableProps {
  caption: string;
  fields: readonly (GuideField & { where?: string })[];
  /** Whether a field that may be left out is marked: of what is sent, not of what comes. */
  isSent?: boolean;
}

/** Fields with their types; a named shape is a link to its own table. */
export function FieldTable({ caption, fields, isSent = false }: FieldTableProps) {
  const rows = fields.map((field) => ({
    ...field,
    remarks: [field.where && field.where !== 'query' ? `in the ${field.where}` : '', field.words]
      .filter(Boolean)
      .join('; '),
  }));
  const hasRemarks = rows.some(({ remarks }) => remarks !== '');
  return (
    <Table caption={caption} isCaptionShown>
      <TableHead>
        <Row>
          <HeadCell>field</HeadCell>
          <HeadCell>type</HeadCell>
          {hasRemarks && <HeadCell>remarks</HeadCell>}
        </Row>
      </TableHead>
      <TableBody>
        {rows.map(({ name, where, type, shape, isRequired, remarks }) => (
          <Row key={`${where}:${name}`}>
            <Cell isRowHead>
              <code className="font-normal">{name || 'the whole'}</code>
              {isSent && isRequired && <span className="font-normal text-ink3"> needed</span>}
            </Cell>
            <Cell className="min-w-40 max-w-md">
              {shape === null ? (
                <code className="break-words">{type}</code>
              ) : (
                <Link href={`/api-guide/shapes#${shape}`}>
                  <code>{type}</code>
                </Link>
              )}
            </Cell>
            {hasRemarks && <Cell className="min-w-40 text-ink2">{remarks}</Cell>}
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
