'use client';

import { DepthChart } from '@/components/charts/depth-chart';
import { YardstickWords } from '@/components/surveys/yardstick-words';
import { FactsStrip } from '@/components/ui/facts-strip';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { CombinationPreview } from '@/lib/schemas/combinations';

/** What each survey brings: stars that none before it lists, and what it adds to the sum. */
export function CombinationReport({ preview }: { preview: CombinationPreview }) {
  const { surveys, stars, entries, shared, semiMajorAxisAu } = preview;
  const peak = (adds: number[]) => Math.max(...adds);
  return (
    <>
      <FactsStrip
        facts={[
          { name: 'stars', value: stars },
          { name: 'entries', help: 'entry', value: entries },
          { name: 'stars in several surveys', help: 'shared-stars', value: shared.length },
        ]}
      />
      <Table caption="What each survey adds, in order">
        <TableHead>
          <tr>
            <HeadCell>survey</HeadCell>
            <HeadCell isNumeric>entries</HeadCell>
            <HeadCell isNumeric>new stars</HeadCell>
            <HeadCell isNumeric>without a map</HeadCell>
            <HeadCell isNumeric>adds where it adds most, stars</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {surveys.map((survey) => (
            <Row key={survey.id}>
              <Cell isRowHead>{survey.name}</Cell>
              <Cell isNumeric>{survey.entries}</Cell>
              <Cell isNumeric>{survey.newStars}</Cell>
              <Cell isNumeric>{survey.withoutMap}</Cell>
              <Cell isNumeric>{peak(survey.adds).toFixed(1)}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <div className="mt-5">
        <DepthChart
          semiMajorAxisAu={Float64Array.from(semiMajorAxisAu)}
          series={surveys.map(({ name, position, adds }) => ({
            name,
            seriesIndex: position,
            // Encoded maps may differ in the last step: no survey takes anything away.
            depth: Float64Array.from(adds, (value) => Math.max(0, value)),
          }))}
          height={260}
          hasAxisNumbers
        />
        <p className="text-chart text-ink3">
          Completeness averaged over planet mass, for{' '}
          <YardstickWords yardstick={preview.yardstick} />. In the table each survey adds to those
          before it; the drawing lays the same parts on each other, the largest at the bottom. Where
          a star is asked for the same position, the deepest map stands for it here, which is never
          more than the run itself finds.
        </p>
      </div>
    </>
  );
}
