import { statusMarks, statusWords } from '@/components/candidates/status-words';
import { Link } from '@/components/ui/link';
import { JupiterMass } from '@/components/ui/notation';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatAsymmetric } from '@/lib/quantities/display';
import type { CompanionView } from '@/lib/schemas/surveys';
import { formatMeasured } from './measured';

function withErrors(value: number | null, lower: number | null, upper: number | null): string {
  if (value === null) return '–';
  if (lower === null || upper === null) return formatMeasured(value, null);
  return formatAsymmetric(value, lower, upper);
}

/** Companions and candidates; only confirmed ones can be detections. */
export function CompanionTable({
  collaboration,
  companions,
}: {
  collaboration: string;
  companions: CompanionView[];
}) {
  if (companions.length === 0) {
    return (
      <p className="py-6 text-ink3">
        No companion or candidate is listed. A companions file, even one without rows, states what
        was found.
      </p>
    );
  }
  return (
    <Table caption="Companions and candidates of the survey">
      <TableHead>
        <Row>
          <HeadCell>companion</HeadCell>
          <HeadCell>status</HeadCell>
          <HeadCell isNumeric>
            mass, <JupiterMass />
          </HeadCell>
          <HeadCell isNumeric>semi-major axis, AU</HeadCell>
          <HeadCell isNumeric>probability of being bound</HeadCell>
          <HeadCell>reference</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {companions.map((companion) => (
          <Row key={companion.id}>
            <Cell isRowHead className="whitespace-nowrap">
              <Link href={`/${collaboration}/candidates/${companion.id}`}>
                {companion.target} {companion.name}
              </Link>
            </Cell>
            <Cell>
              <StateMark kind={statusMarks[companion.status]}>
                {statusWords[companion.status]}
              </StateMark>
            </Cell>
            <Cell isNumeric>
              {withErrors(
                companion.massMjup,
                companion.massErrorLowerMjup,
                companion.massErrorUpperMjup,
              )}
            </Cell>
            <Cell isNumeric>
              {withErrors(
                companion.semiMajorAxisAu,
                companion.semiMajorAxisErrorLowerAu,
                companion.semiMajorAxisErrorUpperAu,
              )}
            </Cell>
            <Cell isNumeric>{companion.probability ?? '–'}</Cell>
            <Cell>{companion.reference ?? '–'}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
