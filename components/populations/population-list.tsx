'use client';

import { ExportButton } from '@/components/exports/export-button';
import { usePopulations } from '@/components/hooks/use-populations';
import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { AxisRange, MassRange } from './law-notation';
import { newestOfEach } from './newest-versions';
import { LawsAlone } from './shape-words';
import { SharedMark } from './shared-mark';

interface PopulationListProps {
  collaboration: string;
  initial: ListedPopulation[];
  canCreate: boolean;
}

/** Each population by its newest version. */
export function PopulationList({ collaboration, initial, canCreate }: PopulationListProps) {
  const { data: versions = initial } = usePopulations(collaboration, initial);
  const populations = newestOfEach(versions);
  const newButton = canCreate && (
    <LinkButton href={`/${collaboration}/populations/new`} variant="primary" icon="add">
      New population
    </LinkButton>
  );
  return (
    <>
      <PageTitle
        title="Populations"
        context="How planets are spread in mass and semi-major axis; an analysis asks how many there are."
        actions={
          populations.length > 0 && (
            <>
              <ExportButton
                collaboration={collaboration}
                source={['populations']}
                title="Files of all populations"
              />
              {newButton}
            </>
          )
        }
      />
      {populations.length === 0 ? (
        <EmptyState title="No population yet" actions={newButton}>
          Describe laws of planet mass and semi-major axis with their ranges, or bring a table of
          whole systems; while you move them, you see which of the planets the surveys would find.
        </EmptyState>
      ) : (
        <section className="pb-10">
          <SectionOpener title="Newest versions" context="indices linear, dN/dM and dN/da" />
          <Table caption="Populations by their newest version">
            <TableHead>
              <tr>
                <HeadCell className="max-md:hidden">key</HeadCell>
                <HeadCell>population</HeadCell>
                <HeadCell className="max-lg:hidden">law</HeadCell>
                <HeadCell className="max-md:hidden">mass</HeadCell>
                <HeadCell className="max-md:hidden">semi-major axis</HeadCell>
                <HeadCell isNumeric>version</HeadCell>
                <HeadCell className="max-lg:hidden">by</HeadCell>
                <HeadCell className="max-md:hidden">used by</HeadCell>
                <HeadCell className="max-md:hidden">state</HeadCell>
              </tr>
            </TableHead>
            <TableBody>
              {populations.map((population) => (
                <Row key={population.id}>
                  <Cell className="text-ink3 max-md:hidden">{population.key}</Cell>
                  <Cell isRowHead>
                    <Link
                      href={`/${collaboration}/populations/${population.key}`}
                      className="text-ink max-md:inline-block max-md:py-2"
                    >
                      {population.name}
                    </Link>
                    <span className="block font-normal text-chart text-ink3 md:hidden">
                      {population.key}; <MassRange definition={population.definition} />,{' '}
                      <AxisRange definition={population.definition} />
                    </span>
                  </Cell>
                  <Cell className="max-lg:hidden">
                    <LawsAlone definition={population.definition} />
                  </Cell>
                  <Cell className="max-md:hidden">
                    <MassRange definition={population.definition} />
                  </Cell>
                  <Cell className="max-md:hidden">
                    <AxisRange definition={population.definition} />
                  </Cell>
                  <Cell isNumeric>{population.version}</Cell>
                  <Cell className="max-lg:hidden">{population.createdBy ?? '–'}</Cell>
                  <Cell className="max-md:hidden">{population.usedBy.join(', ') || '–'}</Cell>
                  <Cell className="whitespace-nowrap max-md:hidden">
                    <SharedMark isShared={population.isShared} />
                  </Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
        </section>
      )}
    </>
  );
}
