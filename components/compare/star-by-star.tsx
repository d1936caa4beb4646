'use client';

import { useState } from 'react';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { formatPercent, formatSignificant } from '@/lib/quantities/display';
import type { ComparedRun } from './differences';

export interface ComparedStar {
  starId: string;
  name: string;
  /** Detection probability under the population of each; null where the star is not in it. */
  a: number | null;
  b: number | null;
}

/** Stars of a run, each with its detection probability. */
function seenStars({ inputs, result }: ComparedRun) {
  const probabilities = new Map(
    result.starTable.map(({ starId, probability }) => [starId, probability]),
  );
  return inputs.stars.flatMap(({ starId, name }) => {
    const seen = probabilities.get(starId);
    return seen === undefined ? [] : [{ starId, name, seen }];
  });
}

/** Stars of either, those whose detection probability differs most first. */
export function compareStars(a: ComparedRun, b: ComparedRun): ComparedStar[] {
  const stars = new Map<string, ComparedStar>();
  for (const { starId, name, seen } of seenStars(a)) {
    stars.set(starId, { starId, name, a: seen, b: null });
  }
  for (const { starId, name, seen } of seenStars(b)) {
    stars.set(starId, { starId, name, a: stars.get(starId)?.a ?? null, b: seen });
  }
  const change = (star: ComparedStar) => Math.abs((star.b ?? 0) - (star.a ?? 0));
  return [...stars.values()].sort((one, other) => change(other) - change(one));
}

const shownAtFirst = 10;

/** Which stars lend one run more than the other. */
export function StarByStar({ a, b, number }: { a: ComparedRun; b: ComparedRun; number: number }) {
  const [isFull, setFull] = useState(false);
  const stars = compareStars(a, b);
  const changed = stars.filter((star) => isTold((star.b ?? 0) - (star.a ?? 0)));
  const sum = (of: 'a' | 'b') => stars.reduce((total, star) => total + (star[of] ?? 0), 0);
  const only = (of: 'a' | 'b', other: 'a' | 'b') =>
    stars.filter((star) => star[of] !== null && star[other] === null).length;
  const cell = (value: number | null) => (value === null ? 'not in it' : formatPercent(value));
  const summary = [
    `stars’ worth of sensitivity: A ${formatSignificant(sum('a'), 3)}, B ${formatSignificant(sum('b'), 3)}`,
    only('a', 'b') > 0 ? `${only('a', 'b')} stars only in A` : '',
    only('b', 'a') > 0 ? `${only('b', 'a')} only in B` : '',
  ].filter(Boolean);
  return (
    <section className="min-w-0">
      <SectionOpener number={number} title="Star by star" context={summary.join('; ')} />
      {changed.length === 0 ? (
        <p className="text-ink2">
          Every star is seen with the same probability in both, to three decimals: the difference
          lies elsewhere.
        </p>
      ) : (
        <>
          <Table caption="Stars by how much their detection probability differs">
            <TableHead>
              <tr>
                <HeadCell>star</HeadCell>
                <HeadCell isNumeric>A</HeadCell>
                <HeadCell isNumeric>B</HeadCell>
                <HeadCell isNumeric>B less A, stars</HeadCell>
              </tr>
            </TableHead>
            <TableBody>
              {changed.slice(0, isFull ? undefined : shownAtFirst).map((star) => (
                <Row key={star.starId}>
                  <Cell isRowHead>{star.name}</Cell>
                  <Cell isNumeric>{cell(star.a)}</Cell>
                  <Cell isNumeric>{cell(star.b)}</Cell>
                  <Cell isNumeric>{signed((star.b ?? 0) - (star.a ?? 0))}</Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
          {changed.length > shownAtFirst && (
            <TextAction className="mt-2" aria-expanded={isFull} onClick={() => setFull(!isFull)}>
              {isFull ? 'Show fewer' : `Show all ${changed.length}`}
            </TextAction>
          )}
        </>
      )}
    </section>
  );
}

/** Whether a difference shows in the three decimals that it is written with. */
export const isTold = (change: number): boolean => Math.abs(change) >= 0.0005;

function signed(value: number): string {
  return `${value < 0 ? '−' : '+'}${Math.abs(value).toFixed(3)}`;
}
