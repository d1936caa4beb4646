'use client';

import { useState } from 'react';
import { percentBelow } from '@/components/runs/level-table';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant } from '@/lib/quantities/display';
import { type ComparedInput, type ComparedRun, isSameInAll, limitsByLevel } from './differences';

/** Inputs that differ, one a row; the rest in one line. */
export function Differences({ sides, inputs }: { sides: ComparedRun[]; inputs: ComparedInput[] }) {
  const differing = inputs.filter((row) => !isSameInAll(row));
  const same = inputs.filter(isSameInAll).map(({ name }) => name.toLowerCase());
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
              {sides.map(({ letter }) => (
                <HeadCell key={letter}>{letter}</HeadCell>
              ))}
            </tr>
          </TableHead>
          <TableBody>
            {differing.map((row) => (
              <Row key={row.name}>
                <Cell isRowHead>{row.name}</Cell>
                {sides.map(({ letter }, side) => (
                  <Cell
                    key={letter}
                    className={
                      row.values[side] === row.values[0] && side > 0 ? '' : 'font-semibold'
                    }
                  >
                    {side > 0 && row.values[side] === row.values[0] ? (
                      <span className="text-ink3">as A</span>
                    ) : (
                      row.values[side]
                    )}
                  </Cell>
                ))}
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
      <p className="mt-2.5 text-ink3 text-note">
        <b className="text-ink2">Same in all</b> {same.length > 0 ? same.join(', ') : 'nothing'}
      </p>
    </section>
  );
}

/** All limits at every level, and their ratios to the first. */
export function ByLevel({ sides, number }: { sides: ComparedRun[]; number: number }) {
  const [first, ...others] = sides;
  const isChosen = (level: number) => Math.abs(level - first.result.credibleLevel) < 1e-9;
  const unit = (side: ComparedRun) =>
    side.result.quantity === 'host_fraction' ? '%' : 'per 100 stars';
  const comparable = others.filter(({ result }) => result.quantity === first.result.quantity);
  return (
    <section className="min-w-0">
      <SectionOpener number={number} title="By credible level" />
      <Table caption="Upper limits by credible level, with their ratios to A">
        <TableHead>
          <tr>
            <HeadCell>level</HeadCell>
            {sides.map((side) => (
              <HeadCell key={side.letter} isNumeric>
                {side.letter}, {unit(side)}
              </HeadCell>
            ))}
            {comparable.map(({ letter }) => (
              <HeadCell key={letter} isNumeric>
                {letter} over A
              </HeadCell>
            ))}
          </tr>
        </TableHead>
        <TableBody>
          {limitsByLevel(sides).map(({ level, limits }) => (
            <Row key={level} isSelected={isChosen(level)}>
              <Cell isRowHead>{describeLevel(level)}</Cell>
              {sides.map(({ letter }, side) => (
                <Cell key={letter} isNumeric className={isChosen(level) ? 'limit' : ''}>
                  {percentBelow(limits[side])}
                </Cell>
              ))}
              {comparable.map((side) => (
                <Cell key={side.letter} isNumeric>
                  {ratio(limits[sides.indexOf(side)], limits[0])}
                </Cell>
              ))}
            </Row>
          ))}
        </TableBody>
      </Table>
      <p className="mt-2 text-chart text-ink3">
        Each with the prior and the ranges of its own run.{' '}
        {sides
          .map(
            ({ letter, result }) =>
              `${letter}: ${formatLimit(result.answer.limit, result.quantity)} at ${describeLevel(result.credibleLevel)}`,
          )
          .join('; ')}
        .
      </p>
    </section>
  );
}

function ratio(limit: number | null, first: number | null): string {
  return limit !== null && first !== null && first > 0 ? formatSignificant(limit / first, 3) : '–';
}

/** The comparison as a paragraph to take along. */
export function ComparisonInWords({ text, number }: { text: string; number: number }) {
  const [said, setSaid] = useState('Copy as text');
  return (
    <section className="min-w-0">
      <SectionOpener number={number} title="In words" context="for a reply or a footnote" />
      <p className="text-body">{text}</p>
      <TextAction
        icon="copy"
        className="mt-2 font-semibold"
        onClick={async () => {
          try {
            await navigator.clipboard.writeText(text);
            setSaid('Copied');
          } catch {
            setSaid('Not copied: the browser refused');
          }
        }}
      >
        <span aria-live="polite">{said}</span>
      </TextAction>
    </section>
  );
}
