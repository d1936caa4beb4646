'use client';

import { useState } from 'react';
import { percentBelow } from '@/components/runs/level-table';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant } from '@/lib/quantities/display';
import { type ComparedInput, type ComparedRun, pairLevels } from './compare-differences';

/** Inputs that differ, one a row; the rest in one line. */
export function Differences({
  inputs,
  differing,
}: {
  inputs: ComparedInput[];
  differing: ComparedInput[];
}) {
  const same = inputs.filter((row) => row.a === row.b).map(({ name }) => name.toLowerCase());
  return (
    <section className="min-w-0">
      <SectionOpener
        number={1}
        title="What differs"
        context={`${differing.length} of ${inputs.length} inputs`}
      />
      {differing.length > 0 && (
        <Table caption="Inputs that differ">
          <TableHead>
            <tr>
              <HeadCell>input</HeadCell>
              <HeadCell>A</HeadCell>
              <HeadCell>B</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {differing.map((row) => (
              <Row key={row.name}>
                <Cell>{row.name}</Cell>
                <Cell className="font-semibold">{row.a}</Cell>
                <Cell className="font-semibold">{row.b}</Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
      <p className="mt-2.5 text-ink3 text-note">
        <b className="text-ink2">Same in both</b> {same.join(', ')}
      </p>
    </section>
  );
}

/** Both limits at every level, and their ratio. */
export function ByLevel({ a, b }: { a: ComparedRun; b: ComparedRun }) {
  const chosen = (level: number) => Math.abs(level - a.result.credibleLevel) < 1e-9;
  return (
    <section className="min-w-0">
      <SectionOpener number={3} title="By credible level" help="credible-level" />
      <Table caption="Upper limits of both by credible level, with their ratio">
        <TableHead>
          <tr>
            <HeadCell>level</HeadCell>
            <HeadCell isNumeric>A, %</HeadCell>
            <HeadCell isNumeric>B, %</HeadCell>
            <HeadCell isNumeric>A over B</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {pairLevels(a, b).map((row) => (
            <Row key={row.level} isSelected={chosen(row.level)}>
              <Cell isRowHead>{describeLevel(row.level)}</Cell>
              <Cell isNumeric className={chosen(row.level) ? 'limit' : ''}>
                {percentBelow(row.a)}
              </Cell>
              <Cell isNumeric className={chosen(row.level) ? 'limit' : ''}>
                {percentBelow(row.b)}
              </Cell>
              <Cell isNumeric>{row.b > 0 ? formatSignificant(row.a / row.b, 2) : '–'}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <p className="mt-2 text-chart text-ink3">
        A: {formatLimit(a.result.answer.limit, a.result.quantity)} at{' '}
        {describeLevel(a.result.credibleLevel)}; B:{' '}
        {formatLimit(b.result.answer.limit, b.result.quantity)} at{' '}
        {describeLevel(b.result.credibleLevel)}.
      </p>
    </section>
  );
}

/** The comparison as a paragraph to take along. */
export function ComparisonInWords({ text }: { text: string }) {
  const [isCopied, setCopied] = useState(false);
  return (
    <section>
      <SectionOpener number={2} title="In words" context="for a reply or a footnote" />
      <p className="text-body">{text}</p>
      <TextAction
        icon="copy"
        className="mt-2 font-semibold"
        onClick={async () => {
          await navigator.clipboard.writeText(text);
          setCopied(true);
        }}
      >
        <span aria-live="polite">{isCopied ? 'Copied' : 'Copy as text'}</span>
      </TextAction>
    </section>
  );
}
