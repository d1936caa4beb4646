'use client';

import { RuleIntervalsChart } from '@/components/charts/rule-intervals-chart';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { describeLevel } from '@/lib/inference';
import { formatSignificant } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { ruleNames } from './overlap-words';

/** The limit under each rule, and what each rule makes of the stars that are shared. */
export function OverlapAnswer({ asked, result }: AnswerProps<'overlap-rules'>) {
  const faults = result.rules.filter(({ fault }) => fault !== null);
  return (
    <>
      <RuleIntervalsChart
        rows={result.rules.map(({ rule, limit, fault }) => ({
          key: rule,
          name: ruleNames[rule],
          limit,
          fault,
          isUsed: rule === result.ruleUsed,
        }))}
        bracket={result.bracket}
        quantity={asked.quantity}
        levelLabel={describeLevel(asked.credibleLevel)}
      />
      {faults.length > 0 && (
        <ul className="mt-3 grid gap-1">
          {faults.map(({ rule, fault }) => (
            <li key={rule}>
              <StateMark kind="warn">
                {ruleNames[rule]}: {fault}
              </StateMark>
            </li>
          ))}
        </ul>
      )}
      <p className="mt-2 text-chart text-ink3">
        Shaded: limits between the larger of the surveys’ probabilities and their sum, which hold
        whatever the correlation between epochs. “Same position” makes a star’s map anew, with the
        age and distance of the survey listed first, so it may fall below the deepest map.
      </p>
      <AnswerNotes notes={result.notes} />
      <div className="mt-6">
        <SectionOpener
          level={3}
          title="Shared stars"
          help="shared-stars"
          context={`${result.shared.length}, with their detection probability under each rule`}
        />
        <SharedStars shared={result.shared} />
      </div>
    </>
  );
}

function SharedStars({ shared }: { shared: AnswerProps<'overlap-rules'>['result']['shared'] }) {
  const percent = (value: number | null) =>
    value === null ? '–' : formatSignificant(100 * value, 3);
  return (
    <div className="max-h-[30rem] overflow-y-auto">
      <Table caption="Stars in several surveys and their detection probability under each rule">
        <TableHead>
          <tr>
            <HeadCell>star</HeadCell>
            <HeadCell className="max-md:hidden">surveys</HeadCell>
            <HeadCell isNumeric className="max-md:whitespace-normal">
              same position, %
            </HeadCell>
            <HeadCell isNumeric className="max-md:whitespace-normal">
              deepest, %
            </HeadCell>
            <HeadCell isNumeric className="max-md:whitespace-normal">
              independent, %
            </HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {shared.map((star) => (
            <Row key={star.starId}>
              <Cell isRowHead className="md:whitespace-nowrap">
                {star.name}
                <span className="block font-normal text-chart text-ink3 md:hidden">
                  {star.surveys.join(', ')}
                </span>
              </Cell>
              <Cell className="max-md:hidden">{star.surveys.join(', ')}</Cell>
              <Cell isNumeric>{percent(star.probability.samePosition)}</Cell>
              <Cell isNumeric>{percent(star.probability.deepest)}</Cell>
              <Cell isNumeric>{percent(star.probability.independent)}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </div>
  );
}
