'use client';

import { useMemo } from 'react';
import { ChartFigure } from '@/components/charts/chart-figure';
import { MapAxes, mapFrame } from '@/components/charts/map-frame';
import { useWidth } from '@/components/charts/use-width';
import { orNull } from '@/components/runs/or-null';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { type Population, populationBox } from '@/lib/population';
import { formatRange } from '@/lib/quantities/display';
import type { MapGrid } from '@/lib/sensitivity';
import { drawSeen } from './draw-seen';

const margin = { left: 46, right: 16, top: 8, bottom: 46 };
const height = 420;
/** Planets of a mass ratio are drawn around one such star. */
const SUN_MSUN = 1;

/** Server and browser differ in the last bit of a logarithm: what both write must not show it. */
function toHundredth(px: number): number {
  return Math.round(100 * px) / 100;
}

/** Planets drawn from a population while no maps exist that could say which of them are seen. */
export function PopulationAlone({
  definition,
  grid,
  reason,
}: {
  definition: Population;
  grid: MapGrid;
  /** Why there are no maps. */
  reason: string;
}) {
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const planets = useMemo(() => orNull(() => drawSeen(definition, undefined)), [definition]);
  const range = populationBox(definition, SUN_MSUN);
  const shown = planets?.massMjup.length ?? 0;
  const empty = useMemo(
    () => ({
      ...grid,
      completeness: new Float64Array(grid.massMjup.length * grid.semiMajorAxisAu.length),
    }),
    [grid],
  );
  const frame = mapFrame(empty, width, height, margin);
  const box = {
    left: toHundredth(frame.x(range.semiMajorAxisMinAu)),
    right: toHundredth(frame.x(range.semiMajorAxisMaxAu)),
    top: toHundredth(frame.y(range.massMaxMjup)),
    bottom: toHundredth(frame.y(range.massMinMjup)),
  };
  return (
    <section className="min-w-0">
      <SectionOpener
        title={`${shown} ${definition.form === 'systems' ? 'companions' : 'planets'} of it`}
        context={
          definition.form === 'mass-ratio'
            ? 'around a star of one solar mass, without any survey'
            : 'without any survey'
        }
      />
      <div className="mb-4">
        <Notice tone="neutral" title="No maps yet.">
          {reason}
        </Notice>
      </div>
      <ChartFigure
        name="populations"
        label={`${shown} planets of the population: ${formatRange(range.massMinMjup, range.massMaxMjup, 'Jupiter masses')} at ${formatRange(range.semiMajorAxisMinAu, range.semiMajorAxisMaxAu, 'AU')}`}
        width={width}
        height={height}
        measure={measure}
        tables={() => [
          {
            caption: 'Drawn planets',
            columns: ['planet', 'mass, Jupiter masses', 'semi-major axis, AU'],
            rows: Array.from(planets?.massMjup ?? [], (mass, i) => [
              String(i + 1),
              mass.toPrecision(3),
              (planets?.semiMajorAxisAu[i] ?? 0).toPrecision(3),
            ]),
          },
        ]}
      >
        {Array.from(planets?.massMjup ?? [], (mass, i) => (
          <circle
            // biome-ignore lint/suspicious/noArrayIndexKey: planet i is always the i-th draw
            key={i}
            className="planet-missed"
            cx={toHundredth(frame.x(planets?.semiMajorAxisAu[i] ?? 0))}
            cy={toHundredth(frame.y(mass))}
            r="4"
          />
        ))}
        <rect
          className="range-box"
          x={box.left}
          y={box.top}
          width={box.right - box.left}
          height={box.bottom - box.top}
        />
        <MapAxes map={empty} frame={frame} />
      </ChartFigure>
    </section>
  );
}
