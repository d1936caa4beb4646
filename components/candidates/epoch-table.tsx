import { Cell, ErrorTerm, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { formatSignificant } from '@/lib/quantities/display';
import type { CandidateDetail, ObservationView } from '@/lib/schemas/candidates';

interface EpochTableProps {
  candidate: CandidateDetail;
  onRemove(id: string): void;
}

/** Decimals so that the error shows two digits. */
function decimalsFor(error: number | null, otherwise: number): number {
  if (error === null || error <= 0) return otherwise;
  return Math.min(5, Math.max(0, 1 - Math.floor(Math.log10(error))));
}

function Measured({
  value,
  error,
  digits,
}: {
  value: number;
  error: number | null;
  digits: number;
}) {
  const decimals = decimalsFor(error, digits);
  return (
    <>
      {value.toFixed(decimals)}
      {error !== null && <ErrorTerm>{error.toFixed(decimals)}</ErrorTerm>}
    </>
  );
}

function sigmaOf(candidate: CandidateDetail, id: string, of: 'commonProperMotion' | 'background') {
  const index = candidate.hypotheses?.observationIds.indexOf(id) ?? -1;
  if (!candidate.hypotheses || index < 0) return '–';
  if (index === 0) return 'reference';
  return formatSignificant(candidate.hypotheses[of].sigmas[index], 2);
}

const sourceOf = ({ source, by, isFromFile, survey }: ObservationView) =>
  [survey && `survey ${survey}`, source, isFromFile ? `file of ${by ?? 'somebody who left'}` : by]
    .filter(Boolean)
    .join(', ') || '–';

/** Every epoch with what was measured, and how far it lies from both hypotheses. */
export function EpochTable({ candidate, onRemove }: EpochTableProps) {
  if (candidate.seen.length === 0) {
    return (
      <p className="py-4 text-ink3">
        No epoch yet. One comes with a companions file that states epoch, separation and position
        angle; further ones are added here.
      </p>
    );
  }
  return (
    <Table caption={`Epochs of ${candidate.star} ${candidate.name}`}>
      <TableHead>
        <Row>
          <HeadCell>epoch</HeadCell>
          <HeadCell isNumeric>separation, ″</HeadCell>
          <HeadCell isNumeric>position angle, °</HeadCell>
          <HeadCell isNumeric>contrast, mag</HeadCell>
          <HeadCell isNumeric>σ from common motion</HeadCell>
          <HeadCell isNumeric>σ from background</HeadCell>
          <HeadCell>source</HeadCell>
          {candidate.can.vet && (
            <HeadCell className="relative">
              <span className="sr-only">delete</span>
            </HeadCell>
          )}
        </Row>
      </TableHead>
      <TableBody>
        {candidate.seen.map((one) => (
          <Row key={one.id}>
            <Cell isRowHead className="whitespace-nowrap">
              {one.observedOn}
            </Cell>
            <Cell isNumeric>
              <Measured value={one.separationArcsec} error={one.separationErrorArcsec} digits={3} />
            </Cell>
            <Cell isNumeric>
              <Measured value={one.positionAngleDeg} error={one.positionAngleErrorDeg} digits={1} />
            </Cell>
            <Cell isNumeric>
              {one.contrastMag === null ? (
                '–'
              ) : (
                <>
                  <Measured value={one.contrastMag} error={one.contrastErrorMag} digits={2} />
                  {one.band !== null && (
                    <>
                      {' '}
                      in <i>{one.band}</i>
                    </>
                  )}
                </>
              )}
            </Cell>
            <Cell isNumeric>{sigmaOf(candidate, one.id, 'commonProperMotion')}</Cell>
            <Cell isNumeric>{sigmaOf(candidate, one.id, 'background')}</Cell>
            <Cell>{sourceOf(one)}</Cell>
            {candidate.can.vet && (
              <Cell className="relative">
                {one.survey === undefined && (
                  <TextAction onClick={() => onRemove(one.id)}>
                    Delete<span className="sr-only"> the epoch {one.observedOn}</span>
                  </TextAction>
                )}
              </Cell>
            )}
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
