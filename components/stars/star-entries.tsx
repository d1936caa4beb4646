'use client';

import { useState } from 'react';
import { seriesColour } from '@/components/charts/series';
import { splitStar } from '@/components/hooks/use-stars';
import { YardstickLines } from '@/components/surveys/yardstick-words';
import { Link } from '@/components/ui/link';
import { SeriesKey } from '@/components/ui/series-key';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { formatPlace, formatPlain } from '@/lib/quantities/display';
import type { StarEntry, StarPage } from '@/lib/schemas/stars';
import { ReasonDialog } from './reason-dialog';

interface StarEntriesProps {
  collaboration: string;
  star: StarPage;
  onChanged(star: StarPage): void;
}

/** The star as each survey lists it, and how it was found to be the same. */
export function StarEntries({ collaboration, star, onChanged }: StarEntriesProps) {
  const [asked, setAsked] = useState<StarEntry | null>(null);
  return (
    <>
      <Table caption={`Entries of ${star.name}`}>
        <TableHead>
          <tr>
            <HeadCell>survey</HeadCell>
            <HeadCell>name there</HeadCell>
            <HeadCell>type</HeadCell>
            <HeadCell>position, °</HeadCell>
            <HeadCell isNumeric className="min-w-24 whitespace-normal">
              host mass, solar masses
            </HeadCell>
            <HeadCell isNumeric>epochs</HeadCell>
            <HeadCell isNumeric>
              detection probability
              <YardstickLines yardstick={star.yardstick} />
            </HeadCell>
            <HeadCell>found by</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {star.entries.map((entry) => (
            <Row key={entry.targetId}>
              <Cell isRowHead>
                <SeriesKey colour={seriesColour(entry.survey.position)}>
                  <Link href={`/${collaboration}/surveys/${entry.survey.slug}`}>
                    {entry.survey.name}
                  </Link>
                </SeriesKey>
              </Cell>
              <Cell className="whitespace-nowrap">
                {entry.name}
                {entry.leftOutReason !== null && (
                  <span className="block text-[12px] text-warn">
                    left out: {entry.leftOutReason}
                  </span>
                )}
              </Cell>
              <Cell>{entry.spectralType ?? '–'}</Cell>
              <Cell className="whitespace-nowrap">
                {entry.raDeg === null || entry.decDeg === null
                  ? '–'
                  : formatPlace(entry.raDeg, entry.decDeg)}
              </Cell>
              <Cell isNumeric>
                {entry.hostMassMsun === null ? '–' : formatPlain(entry.hostMassMsun)}
              </Cell>
              <Cell isNumeric>{entry.epochs}</Cell>
              <Cell isNumeric>
                {entry.probability === null
                  ? (entry.mapFault ?? (entry.mapState === 'waiting' ? 'map on its way' : '–'))
                  : `${Math.round(100 * entry.probability)}\u2009%`}
              </Cell>
              <Cell>
                {entry.evidence ? `${entry.evidence.by} ${entry.evidence.found ?? ''}` : 'first'}{' '}
                {star.can.combine && star.entries.length > 1 && (
                  <TextAction onClick={() => setAsked(entry)}>
                    Part<span className="sr-only"> the entry of {entry.survey.name}</span>
                  </TextAction>
                )}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      {asked && (
        <ReasonDialog
          title={`Is ${asked.name} of ${asked.survey.name} another star?`}
          action="Part it"
          onClose={() => setAsked(null)}
          onDecide={async (why) => {
            onChanged(await splitStar(collaboration, star.id, { targetId: asked.targetId, why }));
          }}
        >
          It becomes a star of its own and later runs count both. Undo it under Overlaps.
        </ReasonDialog>
      )}
    </>
  );
}
