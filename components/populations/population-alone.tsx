'use client';

import { useMemo } from 'react';
import { ChartFigure } from '@/components/charts/chart-figure';
import { MapAxes, mapFrame } from '@/components/charts/map-layers';
import { useWidth } from '@/components/charts/use-width';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { formatRange } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { MapGrid } from '@/lib/sensitivity';
import { drawSeen, PLANETS } from './preview-figures';

const margin = { left: 46, right: 16, top: 8, bottom: 46 };
const height = 420;

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
  definition: PowerLawDefinition;
  grid: MapGrid;
  /** Why there are no maps. */
  reason: string;
}) {
  const [measure, width] = useWidth<HTMLDivElement>(760);
  const planets = useMemo(() => drawSeen(definition, undefined), [definition]);
  const empty = useMemo(
    () => ({
      ...grid,
      completeness: new Float64Array(grid.massMjup.length * grid.semiMajorAxisAu.length),
    }),
    [grid],
  );
  const frame = mapFrame(empty, width, height, margin);
  const box = {
    left: toHundredth(frame.x(definition.semiMajorAxisMinAu)),
    right: toHundredth(frame.x(definition.semiMajorAxisMaxAu)),
    top: toHundredth(frame.y(definition.massMaxMjup)),
    bottom: toHundredth(frame.y(definition.massMinMjup)),
  };
  return (
    <section className="min-w-0">
      <SectionOpener title={`${PLANETS} planets drawn from it`} context="without any survey" />
      <div className="mb-4">
        <Notice tone="neutral" title="No maps yet.">
          {reason}
        </Notice>
      </div>
      <ChartFigure
        label={`${PLANETS} planets drawn from the population: ${formatRange(definition.massMinMjup, definition.massMaxMjup, 'Jupiter masses')} at ${formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, 'AU')}`}
        width={width}
        height={height}
        measure={measure}
        tables={() => [
          {
            caption: 'Drawn planets',
            columns: ['planet', 'mass, Jupiter masses', 'semi-major axis, AU'],
            rows: Array.from(planets.massMjup, (mass, i) => [
              String(i + 1),
              mass.toPrecision(3),
              planets.semiMajorAxisAu[i].toPrecision(3),
            ]),
          },
        ]}
      >
        {Array.from(planets.massMjup, (mass, i) => (
          <circle
            // biome-ignore lint/suspicious/noArrayIndexKey: planet i is always the i-th draw
            key={i}
            className="planet-missed"
            cx={toHundredth(frame.x(planets.semiMajorAxisAu[i]))}
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
