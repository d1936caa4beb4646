'use client';

import { useRouter } from 'next/navigation';
import { useConflicts } from '@/components/hooks/use-adoption';
import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useDay } from '@/components/ui/time-zone';
import type { AgeValue, DistanceValue, StarList, ValueTableView } from '@/lib/schemas/stars';
import { AdoptSeveral } from './adopt-several';
import { StarTabs } from './star-tabs';
import { ageWords, distanceWords } from './star-words';
import { ValueChoice } from './value-choice';

interface AgesScreenProps {
  collaboration: string;
  ages: StarList;
  distances: StarList;
  tables: ValueTableView[];
  canAdopt: boolean;
}

const quantities = [
  { quantity: 'age', title: 'Ages that differ' },
  { quantity: 'distance', title: 'Distances that differ' },
] as const;

function valueWords(value: AgeValue | DistanceValue | null): string {
  if (value === null) return 'taken back';
  return 'ageMyr' in value ? ageWords(value) : distanceWords(value);
}

function Conflicts(props: AgesScreenProps & { index: 0 | 1 }) {
  const { collaboration, canAdopt, index } = props;
  const { quantity, title } = quantities[index];
  const first = quantity === 'age' ? props.ages : props.distances;
  const { data = first, mutate } = useConflicts(collaboration, quantity, first);
  const router = useRouter();
  return (
    <section className="mb-9">
      <SectionOpener
        title={title}
        context={`${data.total} ${data.total === 1 ? 'star' : 'stars'}, by more than 2 σ between surveys, nothing adopted yet`}
      />
      {data.total === 0 && <p className="py-2 text-ink3">No surveys disagree.</p>}
      {canAdopt && data.stars.length > 1 && (
        <AdoptSeveral
          collaboration={collaboration}
          quantity={quantity}
          stars={data.stars}
          onAdopted={() => {
            void mutate();
            router.refresh();
          }}
        />
      )}
      <ul className="grid gap-x-10 gap-y-6 xl:grid-cols-2">
        {data.stars.map((star) => (
          <li key={star.id} className="min-w-0">
            <Link className="font-semibold" href={`/${collaboration}/stars/${star.id}`}>
              {star.name}
            </Link>
            <ValueChoice
              collaboration={collaboration}
              star={star}
              quantity={quantity}
              canAdopt={canAdopt}
              onChanged={() => {
                void mutate();
                router.refresh();
              }}
            />
          </li>
        ))}
      </ul>
    </section>
  );
}

/** Where surveys disagree, and the numbered tables of what was adopted. */
export function AgesScreen(props: AgesScreenProps) {
  const day = useDay();
  const { collaboration, ages, tables } = props;
  return (
    <>
      <StarTabs
        collaboration={collaboration}
        current="ages"
        stars={ages.counts.stars}
        undecided={ages.counts.undecided}
      />
      <p className="mb-6 max-w-[72ch] text-ink2">
        A star in several surveys has the age and distance of the survey listed first, until one is
        adopted. Each adoption makes a new numbered table that never changes; a run names the table
        that it used.
      </p>
      <Conflicts {...props} index={0} />
      <Conflicts {...props} index={1} />
      <section>
        <SectionOpener title="Tables" help="adopted-values" context="newest first" />
        {tables.length === 0 ? (
          <p className="py-2 text-ink3">Nothing was adopted yet.</p>
        ) : (
          <Table caption="Tables of adopted ages and distances">
            <TableHead>
              <tr>
                <HeadCell>table</HeadCell>
                <HeadCell>star</HeadCell>
                <HeadCell>value</HeadCell>
                <HeadCell>source</HeadCell>
                <HeadCell>reason</HeadCell>
                <HeadCell>by</HeadCell>
                <HeadCell isNumeric>stars</HeadCell>
              </tr>
            </TableHead>
            <TableBody>
              {tables.flatMap((table) =>
                table.changes.map((change) => (
                  <Row key={`${table.quantity} ${table.number} ${change.starId}`}>
                    <Cell isRowHead className="whitespace-nowrap">
                      {table.quantity}s {table.number}
                    </Cell>
                    <Cell>
                      <Link href={`/${collaboration}/stars/${change.starId}`}>{change.star}</Link>
                    </Cell>
                    <Cell className="whitespace-nowrap">{valueWords(change.value)}</Cell>
                    <Cell>{change.source}</Cell>
                    <Cell>{table.why}</Cell>
                    <Cell className="whitespace-nowrap">
                      {table.createdBy ?? 'somebody who left'}, {day(table.createdAt)}
                    </Cell>
                    <Cell isNumeric>{table.stars}</Cell>
                  </Row>
                )),
              )}
            </TableBody>
          </Table>
        )}
      </section>
    </>
  );
}
