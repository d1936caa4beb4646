import { FoldSection } from '@/components/ui/fold-section';
import { JupiterMass } from '@/components/ui/notation';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { StatedCandidates } from '@/lib/inference';
import { formatAsymmetric, formatPlain } from '@/lib/quantities/display';
import type { DetectionView, DrawnInputs } from '@/lib/schemas/runs';

interface DetectionsSectionProps {
  companions: DetectionView[];
  undecided: DrawnInputs['undecided'];
  /** Names that the limit counts now. */
  counted: string[];
  /** Names outside the ranges now. */
  outside: string[];
  /** What the limit does with candidates without an answer. */
  candidates: StatedCandidates | undefined;
  /** Set while the setting is another: undecided candidates were judged for the run's ranges. */
  ofRun?: number;
}

/** Each companion of the sample, and whether the limit counts it. */
export function DetectionsSection(props: DetectionsSectionProps) {
  const { companions, undecided, counted, outside, candidates, ofRun } = props;
  const answer = `${counted.length} counted of ${companions.length} confirmed, ${undecided.length} undecided`;
  return (
    <FoldSection number={4} title="Detections" help="detection" context={answer} answer={answer}>
      {companions.length + undecided.length === 0 ? (
        <p className="text-ink2 text-note">
          No companion of these stars is confirmed, and none is waiting for a verdict.
        </p>
      ) : (
        <Table caption="Companions of the sample and what the limit makes of them">
          <TableHead>
            <tr>
              <HeadCell>companion</HeadCell>
              <HeadCell isNumeric>
                mass, <JupiterMass />
              </HeadCell>
              <HeadCell isNumeric>axis, AU</HeadCell>
              <HeadCell>in this limit</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {companions.map((companion) => (
              <Row key={companion.name}>
                <Cell isRowHead>{companion.name}</Cell>
                <Cell isNumeric>{withErrors(companion.massMjup, companion.massErrorsMjup)}</Cell>
                <Cell isNumeric>
                  {withErrors(companion.semiMajorAxisAu, companion.semiMajorAxisErrorsAu)}
                </Cell>
                <Cell>{standing(companion.name, counted, outside)}</Cell>
              </Row>
            ))}
            {undecided.map((candidate) => (
              <Row key={candidate.name}>
                <Cell isRowHead>{candidate.name}</Cell>
                <Cell isNumeric>{plainOrDash(candidate.massMjup)}</Cell>
                <Cell isNumeric>{plainOrDash(candidate.semiMajorAxisAu)}</Cell>
                <Cell>{openStanding(candidate, candidates, ofRun)}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
    </FoldSection>
  );
}

function withErrors(value: number, errors: [number, number] | null): string {
  if (errors === null) return formatAsymmetric(value, 0, 0);
  return formatAsymmetric(value, Math.abs(errors[0]), Math.abs(errors[1]));
}

function standing(name: string, counted: string[], outside: string[]) {
  if (counted.includes(name)) return <StateMark kind="ok">counted</StateMark>;
  return (
    <StateMark kind="waiting">
      {outside.includes(name) ? 'outside the ranges' : 'set aside'}
    </StateMark>
  );
}

const plainOrDash = (value: number | null | undefined) =>
  value == null ? '–' : formatAsymmetric(value, 0, 0);

function openStanding(
  candidate: DrawnInputs['undecided'][number],
  stated: StatedCandidates | undefined,
  ofRun: number | undefined,
) {
  const entry = stated?.entries.find(({ name }) => name === candidate.name);
  if (stated?.treatment !== 'set-aside' && entry?.probability != null) {
    return (
      <StateMark kind="warn">
        {`unvetted, counts with probability ${formatPlain(entry.probability)}`}
        {stated?.treatment === 'rate-dependent' && ' at the reference rate'}
      </StateMark>
    );
  }
  return (
    <StateMark kind={candidate.insideRanges === false ? 'waiting' : 'warn'}>
      {undecidedWords(candidate)}
      {ofRun !== undefined && `, run ${ofRun}`}
    </StateMark>
  );
}

function undecidedWords(candidate: DrawnInputs['undecided'][number]): string {
  if (candidate.insideRanges === null) return 'unvetted, place unknown';
  return candidate.insideRanges ? 'unvetted, inside' : 'unvetted, outside';
}
