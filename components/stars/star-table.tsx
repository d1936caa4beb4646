import Link from 'next/link';
import { ProbabilityBar } from '@/components/charts/probability-bar';
import { seriesColour } from '@/components/charts/series';
import { SeriesKey } from '@/components/ui/series-key';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { StarView } from '@/lib/schemas/stars';
import { ageWords, conflictWords, distanceWords } from './star-words';

function Source({ words, conflict }: { words: string; conflict: string | null }) {
  return (
    <span className="block whitespace-nowrap text-[12px] text-ink3">
      {words}
      {conflict !== null && <b className="text-warn">, {conflict}</b>}
    </span>
  );
}

/** One row a star, each once, with the values that its maps rest on. */
export function StarTable({ collaboration, stars }: { collaboration: string; stars: StarView[] }) {
  return (
    <Table caption="Stars, each once">
      <TableHead>
        <tr>
          <HeadCell>star</HeadCell>
          <HeadCell>surveys</HeadCell>
          <HeadCell isNumeric>age</HeadCell>
          <HeadCell isNumeric>distance</HeadCell>
          <HeadCell isNumeric>epochs</HeadCell>
          <HeadCell isNumeric>detection probability</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {stars.map((star) => (
          <Row key={star.id}>
            <Cell isRowHead>
              <Link href={`/${collaboration}/stars/${star.id}`}>{star.name}</Link>
              {star.otherNames.length > 0 && (
                <span className="block max-w-[26ch] truncate font-normal text-[12px] text-ink3">
                  {star.otherNames.join(', ')}
                </span>
              )}
              {star.undecided > 0 && (
                <span className="block font-normal text-[12px] text-warn">pair to decide</span>
              )}
            </Cell>
            <Cell>
              <span className="flex flex-wrap gap-x-3">
                {star.entries.map(({ targetId, survey }) => (
                  <SeriesKey key={targetId} colour={seriesColour(survey.position)}>
                    {survey.name}
                  </SeriesKey>
                ))}
              </span>
            </Cell>
            <Cell isNumeric>
              {star.age ? ageWords(star.age.value) : '–'}
              {star.age && (
                <Source
                  words={star.age.source.words}
                  conflict={
                    star.age.source.kind === 'adopted' ? null : conflictWords(star.conflicts.age)
                  }
                />
              )}
            </Cell>
            <Cell isNumeric>
              {star.distance ? distanceWords(star.distance.value) : '–'}
              {star.distance && (
                <Source
                  words={star.distance.source.words}
                  conflict={
                    star.distance.source.kind === 'adopted'
                      ? null
                      : conflictWords(star.conflicts.distance)
                  }
                />
              )}
            </Cell>
            <Cell isNumeric>{star.epochs}</Cell>
            <Cell isNumeric>
              {star.probability === null ? (
                '–'
              ) : (
                <>
                  <ProbabilityBar value={star.probability} /> {Math.round(100 * star.probability)}
                  {'\u2009'}%
                </>
              )}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
