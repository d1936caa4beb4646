'use client';

import { useState } from 'react';
import { seriesColour } from '@/components/charts/series';
import { useMapStore } from '@/components/hooks/use-maps';
import { Link } from '@/components/ui/link';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import type { MapStore } from '@/lib/schemas/map-states';
import { listReasons } from './standing-words';
import { SurveyMaps } from './survey-maps';

interface MapStoreScreenProps {
  collaboration: string;
  initial: MapStore;
}

/** The maps of all surveys: how many are current, which are not, and why. */
export function MapStoreScreen({ collaboration, initial }: MapStoreScreenProps) {
  const { data: store = initial, mutate } = useMapStore(collaboration, initial);
  const [slug, setSlug] = useState<string>();
  const shown =
    store.surveys.find((survey) => survey.slug === slug) ??
    store.surveys.find(({ standings }) => standings.stale + standings.missing > 0) ??
    store.surveys[0];
  return (
    <>
      <PageTitle
        title="Completeness maps"
        crumbs={[{ href: `/${collaboration}/surveys`, label: 'Surveys' }, { label: 'Maps' }]}
        context="A map follows from curves, age, distance, magnitude, cooling relation, settings and engine; it is stale once one of them has changed."
      />
      {store.surveys.length === 0 ? (
        <p className="py-3 text-ink2">No survey yet.</p>
      ) : (
        <div className="grid grid-cols-1 gap-8 pb-10">
          <section>
            <SectionOpener number={1} title="Surveys" />
            <StoreTable store={store} shownSlug={shown?.slug} {...{ collaboration, setSlug }} />
          </section>
          {shown && (
            <section>
              <SectionOpener number={2} title={`Maps of ${shown.name}`} help="completeness-map" />
              <SurveyMaps
                key={shown.slug}
                collaboration={collaboration}
                slug={shown.slug}
                canRefresh={shown.canRefresh}
                onStarted={() => void mutate()}
              />
            </section>
          )}
        </div>
      )}
    </>
  );
}

interface StoreTableProps {
  collaboration: string;
  store: MapStore;
  shownSlug?: string;
  setSlug(slug: string): void;
}

function StoreTable({ collaboration, store, shownSlug, setSlug }: StoreTableProps) {
  return (
    <Table caption="Maps of each survey by their state">
      <TableHead>
        <tr>
          <HeadCell>survey</HeadCell>
          <HeadCell isNumeric>current</HeadCell>
          <HeadCell isNumeric>stale</HeadCell>
          <HeadCell isNumeric>missing</HeadCell>
          <HeadCell isNumeric>cannot be made</HeadCell>
          <HeadCell isNumeric>as uploaded</HeadCell>
          <HeadCell isNumeric>no curve and no map</HeadCell>
          <HeadCell>why not current</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {store.surveys.map(({ slug, name, position, standings, reasons }) => (
          <Row key={slug} isSelected={slug === shownSlug}>
            <Cell isRowHead className="whitespace-nowrap">
              <span
                aria-hidden="true"
                className="mr-2 inline-block size-[11px]"
                style={{ backgroundColor: seriesColour(position) }}
              />
              <Link href={`/${collaboration}/surveys/${slug}`} className="text-ink">
                {name}
              </Link>
            </Cell>
            <Cell isNumeric>{standings.current}</Cell>
            <Cell isNumeric>{standings.stale}</Cell>
            <Cell isNumeric>{standings.missing}</Cell>
            <Cell isNumeric>{standings.failed}</Cell>
            <Cell isNumeric>{standings.uploaded}</Cell>
            <Cell isNumeric>{standings.none}</Cell>
            <Cell className="min-w-48">
              {listReasons(reasons) || '–'}{' '}
              {slug !== shownSlug && (
                <TextAction onClick={() => setSlug(slug)}>
                  Show<span className="sr-only"> the maps of {name}</span>
                </TextAction>
              )}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
