'use client';

import { useEffect, useMemo, useState } from 'react';
import { StepsChart } from '@/components/charts/steps-chart';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import { sampleOf } from '@/components/runs/live-sample';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { formatLimit } from '@/lib/quantities/display';
import type { ComparedRun } from './differences';
import { settingOf, type WayFromAToB, wayFromAToB, whyNoWay } from './from-a-to-b';

type Way = WayFromAToB | 'no way';

/** Which difference moves the limit by how much. */
export function WaySection({
  collaboration,
  a,
  b,
  number,
}: {
  collaboration: string;
  a: ComparedRun;
  b: ComparedRun;
  number: number;
}) {
  const [isInOrder, setInOrder] = useState(false);
  const why = whyNoWay(a, b);
  const { way, fault } = useWay(collaboration, a, b, why === undefined);
  const steps = way === undefined || way === 'no way' ? [] : way.steps;
  return (
    <section className="min-w-0">
      <SectionOpener
        number={number}
        title={`From ${a.letter} to ${b.letter}`}
        context="what each difference does to the limit"
        tools={
          steps.length > 1 && (
            <span className="flex gap-3.5">
              {[false, true].map((option) => (
                <button
                  key={String(option)}
                  type="button"
                  aria-pressed={option === isInOrder}
                  className={`border-b-2 max-md:min-h-11 ${option === isInOrder ? 'border-ink font-semibold text-ink' : 'border-transparent text-ink3'}`}
                  onClick={() => setInOrder(option)}
                >
                  {option ? 'in order' : 'averaged over all orders'}
                </button>
              ))}
            </span>
          )
        }
      />
      {why !== undefined && <p className="text-ink2">{why}</p>}
      {fault !== undefined && (
        <Notice tone="bad" title="The steps could not be computed.">
          {fault}
        </Notice>
      )}
      {why === undefined && fault === undefined && way === undefined && (
        <p className="rounded-plate bg-well px-5 py-10 text-ink3 text-note" role="status">
          Computing the limit with every mixture of the two recipes
        </p>
      )}
      {way === 'no way' && (
        <p className="text-ink2">
          No setting that moves a limit differs between the two, or one of their mixtures has no
          answer.
        </p>
      )}
      {way !== undefined && way !== 'no way' && (
        <>
          <StepsChart
            from={{ name: `${a.letter} ${a.name}`, limit: way.from }}
            to={{ name: `${b.letter} ${b.name}`, limit: way.to }}
            steps={way.steps.map(({ name, averaged, inOrder }) => ({
              name,
              change: isInOrder ? inOrder : averaged,
            }))}
            quantity={a.result.quantity}
            wayLabel={isInOrder ? 'in order, from the top' : 'averaged over all orders'}
          />
          <Recorded {...{ a, b, way }} />
        </>
      )}
    </section>
  );
}

/** A computation in the page that misses what a run recorded says so. */
function Recorded({ a, b, way }: { a: ComparedRun; b: ComparedRun; way: WayFromAToB }) {
  const misses = [
    { side: a, limit: way.from },
    { side: b, limit: way.to },
  ].filter(({ side, limit }) => Math.abs(limit / side.result.answer.limit - 1) > 1e-3);
  if (misses.length === 0) return null;
  return (
    <p className="mt-2 text-note text-warn">
      {misses
        .map(
          ({ side, limit }) =>
            `${side.letter} is ${formatLimit(limit, side.result.quantity)} when computed here, ${formatLimit(side.result.answer.limit, side.result.quantity)} as recorded`,
        )
        .join('; ')}
      : an earlier engine made one of them.
    </p>
  );
}

/** Same stars on the same grid with the same maps, in the same order. */
function haveSameMaps({ inputs: one }: ComparedRun, { inputs: other }: ComparedRun): boolean {
  return (
    one.stars.length === other.stars.length &&
    one.grid.massMjup.join() === other.grid.massMjup.join() &&
    one.grid.semiMajorAxisAu.join() === other.grid.semiMajorAxisAu.join() &&
    one.stars.every(
      ({ starId, mapChecksum }, index) =>
        other.stars[index].starId === starId && other.stars[index].mapChecksum === mapChecksum,
    )
  );
}

function useWay(collaboration: string, a: ComparedRun, b: ComparedRun, isPossible: boolean) {
  const mapsOfA = useRunMaps(collaboration, isPossible ? a.run : undefined);
  const mapsOfB = useRunMaps(collaboration, isPossible ? b.run : undefined);
  const [state, setState] = useState<{ way?: Way; fault?: string }>({});
  const isSameSample = useMemo(() => haveSameMaps(a, b), [a, b]);
  useEffect(() => {
    const [from, to] = [settingOf(a), settingOf(b)];
    if (!mapsOfA.data || !mapsOfB.data || !from || !to) return;
    let isLeft = false;
    const ends = {
      a: { setting: from, sample: sampleOf(a.inputs, mapsOfA.data) },
      b: { setting: to, sample: sampleOf(b.inputs, mapsOfB.data) },
    };
    const pause = () =>
      new Promise<void>((resolve, reject) => {
        setTimeout(() => (isLeft ? reject(new Error('left')) : resolve()));
      });
    wayFromAToB(ends, isSameSample, pause)
      .then((way) => setState({ way: way ?? 'no way' }))
      .catch((reason: unknown) => {
        if (!isLeft) setState({ fault: sentenceOf(reason) });
      });
    return () => {
      isLeft = true;
    };
  }, [a, b, mapsOfA.data, mapsOfB.data, isSameSample]);
  const error = mapsOfA.error ?? mapsOfB.error;
  return error === undefined ? state : { fault: sentenceOf(error) };
}
