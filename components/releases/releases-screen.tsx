'use client';

import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { useDay } from '@/components/ui/time-zone';
import { describeLevel } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { BundleImportView } from '@/lib/schemas/bundles';
import type { GuestLinkView, ReleaseView } from '@/lib/schemas/releases';
import { BundlePanel } from './bundle-panel';
import { GuestLinks } from './guest-links';
import { furtherGround, stateWords } from './release-words';

interface ReleasesScreenProps {
  collaboration: string;
  releases: ReleaseView[];
  imports: BundleImportView[];
  links: GuestLinkView[];
  can: { freeze: boolean; bring: boolean; link: boolean };
}

/** What the collaboration has made public, what waits for a signature, and what came in. */
export function ReleasesScreen(props: ReleasesScreenProps) {
  const { collaboration, releases, imports, links, can } = props;
  const newButton = can.freeze && (
    <LinkButton href={`/${collaboration}/releases/new`} variant="primary" icon="add">
      New release
    </LinkButton>
  );
  return (
    <>
      <PageTitle
        title="Releases"
        context="Frozen runs on their way to the public: each is run again from its inputs before it goes out."
        actions={releases.length > 0 && newButton}
      />
      {releases.length === 0 ? (
        <EmptyState title="No release yet" actions={newButton}>
          A release freezes one or several runs with everything they rest on. A statistician signs
          it off, another author or owner agrees, the runs are made again from their inputs, and the
          page gets a public address. It begins with a frozen run: open an analysis and choose
          Freeze.
        </EmptyState>
      ) : (
        <section className="min-w-0">
          <SectionOpener
            title="All releases"
            context="limits with their level, and what they rest on"
          />
          <ReleaseTable collaboration={collaboration} releases={releases} />
        </section>
      )}
      <div className="grid gap-x-12 gap-y-8 pt-9 pb-10 lg:grid-cols-2">
        <GuestLinks collaboration={collaboration} initial={links} canEnd={can.link} />
        <BundlePanel collaboration={collaboration} initial={imports} canBring={can.bring} />
      </div>
    </>
  );
}

function ReleaseTable({
  collaboration,
  releases,
}: {
  collaboration: string;
  releases: ReleaseView[];
}) {
  const day = useDay();
  return (
    <Table caption="Releases, the newest first">
      <TableHead>
        <tr>
          <HeadCell>release</HeadCell>
          <HeadCell>title</HeadCell>
          <HeadCell>limit</HeadCell>
          <HeadCell>runs</HeadCell>
          <HeadCell className="max-md:hidden">state</HeadCell>
          <HeadCell>date</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {releases.map((release) => {
          const [first] = release.runs;
          const { kind, words } = stateWords[release.state];
          return (
            <Row key={release.id}>
              <Cell isRowHead className="whitespace-nowrap">
                <Link href={`/${collaboration}/releases/${release.key}`}>{release.key}</Link>
              </Cell>
              <Cell className="min-w-36 md:min-w-56">
                {release.title}
                <span className="block md:hidden">
                  <StateMark kind={kind}>{words}</StateMark>
                </span>
              </Cell>
              <Cell className="min-w-40 md:min-w-72">
                {first && (
                  <>
                    <span className="limit">{formatLimit(first.limit, first.quantity)}</span> (
                    {describeLevel(first.credibleLevel)})
                    <span className="block text-chart text-ink3">
                      {first.ranges}, {furtherGround(first)}
                    </span>
                  </>
                )}
              </Cell>
              <Cell className="whitespace-nowrap">
                {release.runs
                  .map(({ analysisKey, number }) => `${analysisKey}, run ${number}`)
                  .join('; ')}
              </Cell>
              <Cell className="whitespace-nowrap max-md:hidden">
                <StateMark kind={kind}>{words}</StateMark>
              </Cell>
              <Cell className="whitespace-nowrap">
                {day(release.published?.at ?? release.createdAt)}
              </Cell>
            </Row>
          );
        })}
      </TableBody>
    </Table>
  );
}
