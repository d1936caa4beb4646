'use client';

import dynamic from 'next/dynamic';
import { useMemo } from 'react';
import { FigureFrame } from '@/components/figures/figure-frame';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { describeLevel } from '@/lib/inference';
import { compareAddress, type SideAddress } from './address';
import { ComparePlate } from './compare-plate';
import { type CompareSide, comparedRun } from './compared-run';
import { CopyLink } from './copy-link';
import {
  type ComparedInput,
  type ComparedRun,
  compareInputs,
  isSameInAll,
  otherQuestions,
} from './differences';
import { PickList, type RunChoice } from './pick-list';
import { compareSentences, titleOf } from './words';

/** Below the limits: drawn by the server, made live after them. */
const ByLevel = dynamic(async () => (await import('./sections')).ByLevel);
const ComparisonInWords = dynamic(async () => (await import('./sections')).ComparisonInWords);
const Differences = dynamic(async () => (await import('./sections')).Differences);
const StarByStar = dynamic(async () => (await import('./star-by-star')).StarByStar);
const WaySection = dynamic(async () => (await import('./way-section')).WaySection);

interface CompareScreenProps {
  collaboration: string;
  choices: RunChoice[];
  sides: CompareSide[];
}

/** Two to six runs on one axis: their limits, and what differs between them. */
export function CompareScreen({ collaboration, choices, sides }: CompareScreenProps) {
  const [known, missing] = useMemo(() => {
    const runs = sides.map((side) => comparedRun(side));
    return [
      runs.flatMap((run) => run ?? []).map(withLetter),
      sides.filter((_side, i) => runs[i] === undefined),
    ];
  }, [sides]);
  const isReady = known.length >= 2;
  return (
    <>
      <PageTitle
        title={isReady ? titleOf(known) : 'Comparison'}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { label: 'Comparison' },
        ]}
        actions={
          isReady && (
            <>
              <LinkButton href={swapped(collaboration, known)} icon="compare">
                {known.length === 2 ? 'Swap A and B' : 'Reverse the order'}
              </LinkButton>
              <CopyLink />
            </>
          )
        }
      />
      {choices.length === 0 ? (
        <EmptyState
          title="No finished run to compare yet"
          actions={
            <LinkButton href={`/${collaboration}/analyses`} variant="primary">
              To the analyses
            </LinkButton>
          }
        >
          Run an analysis, then a copy of it with one thing changed: the two stand here on one axis.
        </EmptyState>
      ) : (
        <PickList collaboration={collaboration} choices={choices} chosen={known} />
      )}
      {missing.length > 0 && (
        <div className="mb-4">
          <Notice
            tone="warn"
            title={`${missing.map(({ address }) => sideName(address)).join(' and ')}:`}
          >
            no finished run of this name to compare.
          </Notice>
        </div>
      )}
      {isReady && <Comparison collaboration={collaboration} sides={known} />}
      {!isReady && choices.length > 0 && (
        <p className="max-w-[60ch] text-ink2">
          {choices.length === 1
            ? 'Only one run is finished. Copy its analysis, change the copy and run it: then the two stand here on one axis.'
            : 'Choose two to six finished runs: any run of any analysis, not only the newest.'}
        </p>
      )}
    </>
  );
}

const letters = 'ABCDEF';
const withLetter = (side: Omit<ComparedRun, 'letter'>, index: number): ComparedRun => ({
  ...side,
  letter: letters[index],
});

const sideName = ({ key, run }: SideAddress) => (run === undefined ? key : `${key}, run ${run}`);

const swapped = (collaboration: string, sides: ComparedRun[]) =>
  compareAddress(collaboration, sides.map(({ address }) => address).reverse());

function Comparison({ collaboration, sides }: { collaboration: string; sides: ComparedRun[] }) {
  const inputs = compareInputs(sides);
  const differing = inputs.filter((row) => !isSameInAll(row));
  const [a, b] = sides;
  const isTwo = sides.length === 2;
  return (
    <FigureFrame
      collaboration={collaboration}
      file={sides.map(({ address, run }) => `${address.key}-run-${run.number}`).join('-and-')}
      title={titleOf(sides)}
      label="draft, comparison"
      caption={sides.map(
        ({ letter, name, run, result }) =>
          `${letter}: ${name}, run ${run.number}, ${result.statement.sentence}; ${describeLevel(result.credibleLevel)}. SHA-256 ${run.resultDigest ?? ''}`,
      )}
    >
      <ComparePlate collaboration={collaboration} sides={sides} inputs={inputs} />
      <OtherQuestions collaboration={collaboration} sides={sides} differing={differing} />
      <div
        className={`mt-8 grid gap-x-14 gap-y-8 pb-10 ${isTwo ? 'xl:grid-cols-[minmax(0,1fr)_400px]' : ''}`}
      >
        <div className="grid min-w-0 content-start gap-8">
          <Differences sides={sides} inputs={inputs} />
          <WaySection key={`${a.run.id} ${b.run.id}`} {...{ collaboration, a, b }} number={2} />
          <ComparisonInWords text={compareSentences(sides, differing)} number={3} />
        </div>
        <div className="grid min-w-0 content-start gap-8">
          <ByLevel sides={sides} number={4} />
          {isTwo && <StarByStar a={a} b={b} number={5} />}
        </div>
      </div>
    </FigureFrame>
  );
}

/** Ranges, level or quantity that differ make limits of different questions. */
function OtherQuestions({
  collaboration,
  sides,
  differing,
}: {
  collaboration: string;
  sides: ComparedRun[];
  differing: ComparedInput[];
}) {
  const rows = differing.filter((row) => row.changesQuestion);
  const title = otherQuestions(differing);
  if (title === undefined) return null;
  const [a, ...others] = sides;
  const query = alignQuery(a, rows);
  const apart = others.filter((_, index) =>
    rows.some(({ values }) => values[index + 1] !== values[0]),
  );
  return (
    <div className="mt-4">
      <Notice
        tone="warn"
        title={title}
        actions={
          query !== '' &&
          apart.map(({ letter, address }) => (
            <LinkButton
              key={letter}
              size="small"
              href={`/${collaboration}/analyses/${address.key}?${query}`}
            >
              Set {letter} as A
            </LinkButton>
          ))
        }
      >
        Compare them only after aligning: the result opens with the ranges and the level of A, and
        can be saved as a run from there.
      </Notice>
    </div>
  );
}

/** The live setting that would ask another side the question of A. */
function alignQuery({ definition, result }: ComparedRun, rows: ComparedInput[]): string {
  const parts: Record<string, string> = {};
  for (const { name } of rows) {
    if (name === 'Planet mass' && definition.form !== 'mass-ratio') {
      parts.mass = `${definition.massMinMjup}-${definition.massMaxMjup}`;
    }
    if (name === 'Semi-major axis') {
      parts.axis = `${definition.semiMajorAxisMinAu}-${definition.semiMajorAxisMaxAu}`;
    }
    if (name === 'Level') parts.level = String(result.credibleLevel);
    if (name === 'Likelihood') {
      parts.likelihood = result.quantity === 'host_fraction' ? 'host-fraction' : 'mean-number';
    }
  }
  return new URLSearchParams(parts).toString();
}
