'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { CANDIDATES_SHOWN, useCandidates } from '@/components/hooks/use-candidates';
import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { JupiterMass } from '@/components/ui/notation';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { CandidateList, CandidateView, CompanionStatus } from '@/lib/schemas/candidates';
import { readStatus, statuses, statusMarks, statusWords } from './status-words';
import { withErrors } from './verdict-history';

interface CandidateListPanelProps {
  collaboration: string;
  initial: CandidateList;
  surveys: { slug: string; name: string }[];
  filter: { survey?: string; status?: CompanionStatus };
}

function rangesOf({ isInsideRanges }: CandidateView): string {
  if (isInsideRanges === null) return '–';
  return isInsideRanges ? 'inside' : 'outside';
}

const massOf = ({ massMjup, massErrorsMjup }: CandidateView) =>
  massMjup === null ? '–' : withErrors(massMjup, massErrorsMjup, '');

const axisOf = ({ semiMajorAxisAu, semiMajorAxisErrorsAu }: CandidateView) =>
  semiMajorAxisAu === null ? '–' : withErrors(semiMajorAxisAu, semiMajorAxisErrorsAu, '');

/** Columns that narrower screens fold under the name. */
const fromMiddle = 'max-md:hidden';
const fromBroad = 'max-lg:hidden';
const fromWide = 'max-xl:hidden';

/** Under the name: what the columns that are left out would hold. */
function FoldedValues({ candidate, lead }: { candidate: CandidateView; lead: string | null }) {
  const { survey, massMjup, semiMajorAxisAu, probability, isInsideRanges } = candidate;
  return (
    <span className="block whitespace-normal font-normal text-chart text-ink2 xl:hidden">
      <span className="block lg:hidden">{survey.name}</span>
      {massMjup !== null && (
        <span className="block md:hidden">
          {massOf(candidate)}
          {THIN_SPACE}
          <JupiterMass />
        </span>
      )}
      {semiMajorAxisAu !== null && (
        <span className="block md:hidden">
          {axisOf(candidate)}
          {THIN_SPACE}AU
        </span>
      )}
      {probability !== null && (
        <span className="block">probability of being bound {formatPlain(probability)}</span>
      )}
      {isInsideRanges !== null && (
        <span className="block">
          {rangesOf(candidate)} the ranges of {lead ?? 'the lead analysis'}
        </span>
      )}
    </span>
  );
}

function CandidateTable({
  collaboration,
  candidates,
  lead,
}: {
  collaboration: string;
  candidates: CandidateView[];
  lead: string | null;
}) {
  return (
    <Table caption="Candidates of all surveys, those that wait for a verdict first">
      <TableHead>
        <Row>
          <HeadCell>candidate</HeadCell>
          <HeadCell className={fromBroad}>survey</HeadCell>
          <HeadCell>status</HeadCell>
          <HeadCell isNumeric className={fromWide}>
            epochs
          </HeadCell>
          <HeadCell isNumeric className={fromMiddle}>
            mass, <JupiterMass />
          </HeadCell>
          <HeadCell isNumeric className={fromMiddle}>
            semi-major axis, AU
          </HeadCell>
          <HeadCell isNumeric className={fromWide}>
            probability of being bound
          </HeadCell>
          <HeadCell className={fromWide}>{lead === null ? 'ranges' : `ranges of ${lead}`}</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {candidates.map((one) => (
          <Row key={one.id}>
            <Cell isRowHead className="whitespace-nowrap">
              <Link
                className="underline underline-offset-3"
                href={`/${collaboration}/candidates/${one.id}`}
              >
                {one.star} {one.name}
              </Link>
              <FoldedValues candidate={one} lead={lead} />
            </Cell>
            <Cell className={`whitespace-nowrap ${fromBroad}`}>{one.survey.name}</Cell>
            <Cell className="md:whitespace-nowrap">
              <StateMark kind={statusMarks[one.status]}>
                {statusWords[one.status]}
                {one.proposals > 0 &&
                  `, ${one.proposals === 1 ? '1 proposal' : `${one.proposals} proposals`}`}
              </StateMark>
            </Cell>
            <Cell isNumeric className={fromWide}>
              {one.observations === 0 ? '–' : one.observations}
            </Cell>
            <Cell isNumeric className={fromMiddle}>
              {massOf(one)}
            </Cell>
            <Cell isNumeric className={fromMiddle}>
              {axisOf(one)}
            </Cell>
            <Cell isNumeric className={fromWide}>
              {one.probability === null ? '–' : formatPlain(one.probability)}
            </Cell>
            <Cell className={fromWide}>{rangesOf(one)}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** Every candidate of the collaboration; what waits for a person comes first. */
export function CandidateListPanel(props: CandidateListPanelProps) {
  const { collaboration, initial, surveys } = props;
  const [filter, setFilter] = useState(props.filter);
  useAddressQuery({
    ...(filter.survey !== undefined && { survey: filter.survey }),
    ...(filter.status !== undefined && { status: filter.status }),
  });
  const isFirst = filter.survey === props.filter.survey && filter.status === props.filter.status;
  const { data: list = initial, error } = useCandidates(
    collaboration,
    filter,
    isFirst ? initial : undefined,
  );
  const total = Object.values(list.counts).reduce((sum, count) => sum + count, 0);
  if (total === 0 && filter.survey === undefined) {
    return (
      <EmptyState title="No candidate yet">
        Candidates come with a survey's file of companions: one row a source, with its status and,
        where it was seen, epoch, separation and position angle.
      </EmptyState>
    );
  }
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end gap-4">
        <SelectField
          label="Survey"
          value={filter.survey ?? ''}
          onChange={({ target }) =>
            setFilter({ ...filter, survey: target.value === '' ? undefined : target.value })
          }
          options={[
            { value: '', label: 'all surveys' },
            ...surveys.map(({ slug, name }) => ({ value: slug, label: name })),
          ]}
        />
        <SelectField
          label="Status"
          value={filter.status ?? ''}
          onChange={({ target }) => setFilter({ ...filter, status: readStatus(target.value) })}
          options={[
            { value: '', label: `all, ${total}` },
            ...statuses.map((status) => ({
              value: status,
              label: `${statusWords[status]}, ${list.counts[status]}`,
            })),
          ]}
        />
      </div>
      {error !== undefined && <Notice tone="bad" title={sentenceOf(error)} isAnnounced />}
      {list.candidates.length === 0 ? (
        <p className="py-4 text-ink3">No candidate has this status here.</p>
      ) : (
        <CandidateTable
          collaboration={collaboration}
          candidates={list.candidates}
          lead={list.lead}
        />
      )}
      {list.total > list.candidates.length && (
        <p className="mt-3 text-ink3 text-note">
          The first {CANDIDATES_SHOWN} of {list.total}: choose a survey or a status.
        </p>
      )}
    </>
  );
}
