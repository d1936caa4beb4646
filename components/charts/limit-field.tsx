'use client';

import { memo, useId, useMemo } from 'react';
import type { RateQuantity } from '@/lib/quantities/display';
import { gridBands, gridLines, type PlacedGrid } from './grid-contours';
import { contourName, limitBands } from './limit-bands';
import { type Box, labelPoint } from './map-contours';

interface LimitFieldProps {
  /** Shape [row, column], row-major; NaN where there is no limit. */
  limit: Float64Array;
  /** 1 where the prior sets the limit, same shape. */
  isSetByPrior?: Uint8Array;
  columnsPx: number[];
  rowsPx: number[];
  frame: Box;
  quantity: RateQuantity;
  /** Boxes that contour numbers keep clear of. */
  taken?: Box[];
}

/** A stronger limit is deeper on the ramp; hatched where the prior sets it, blank where there is none. */
export const LimitField = memo(function LimitField(props: LimitFieldProps) {
  const { limit, isSetByPrior, columnsPx, rowsPx, frame, quantity, taken } = props;
  const id = useId();
  const layers = useMemo(() => {
    // Contours of −ln: between nodes a limit changes by a factor, not by a difference.
    const values = limit.map((one) => -Math.log(one));
    const known = limit.filter((one) => one > 0);
    const bands = limitBands(
      known.reduce((a, b) => Math.min(a, b), 1e9),
      known.reduce((a, b) => Math.max(a, b), 0),
    );
    const grid: PlacedGrid = { values, columnsPx, rowsPx };
    const levels = (limits: number[]) => limits.map((one) => -Math.log(one));
    const none = Float64Array.from(limit, (one) => (Number.isFinite(one) ? 0 : 1));
    return {
      bands: gridBands(grid, levels(bands.limits)).map((band, index) => ({
        ...band,
        fill: `var(--q${bands.ramp[index]})`,
      })),
      lines: gridLines(grid, levels(bands.contours)).map((line) => ({
        ...line,
        limit: Math.exp(-line.level),
        ramp:
          bands.ramp[bands.limits.findIndex((one) => one <= Math.exp(-line.level) * 1.0001)] ?? 0,
      })),
      hatched: isSetByPrior ? gridBands({ ...grid, values: isSetByPrior }, [0.5]) : [],
      blank: none.includes(1) ? gridBands({ ...grid, values: none }, [0.5]) : [],
    };
  }, [limit, isSetByPrior, columnsPx, rowsPx]);
  const numbers = useMemo(
    () => contourNumbers(layers.lines, frame, taken ?? []),
    [layers, frame, taken],
  );

  return (
    <g>
      <defs>
        <pattern
          id={`${id}-hatch`}
          width="7"
          height="7"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <line className="field-hatch" x1="0" x2="0" y1="0" y2="7" />
        </pattern>
        <clipPath id={`${id}-frame`}>
          <rect
            x={frame.left}
            y={frame.top}
            width={frame.right - frame.left}
            height={frame.bottom - frame.top}
          />
        </clipPath>
      </defs>
      <g clipPath={`url(#${id}-frame)`}>
        <rect
          x={frame.left}
          y={frame.top}
          width={frame.right - frame.left}
          height={frame.bottom - frame.top}
          fill="var(--q0)"
        />
        {layers.bands.map((band) => (
          <path key={band.level} d={band.path} fill={band.fill} fillRule="evenodd" />
        ))}
        {layers.lines.map((line) => (
          <path key={line.level} className="isoline isoline-half" d={line.path} />
        ))}
        {layers.hatched.map((area) => (
          <path key={area.level} d={area.path} fill={`url(#${id}-hatch)`} fillRule="evenodd" />
        ))}
        {layers.blank.map((area) => (
          <path key={area.level} d={area.path} fill="var(--page)" fillRule="evenodd" />
        ))}
      </g>
      {numbers.map(({ limit: at, ramp, x, y }) => (
        <text
          key={at}
          className="isoline-text"
          style={{
            fill: ramp < 8 ? 'var(--iso-low)' : ramp < 11 ? 'var(--on-deep)' : 'var(--iso-high)',
            stroke: `var(--q${ramp})`,
          }}
          x={x}
          y={y + 4}
          textAnchor="middle"
        >
          {contourName(at, quantity)}
        </text>
      ))}
    </g>
  );
});

type Line = ReturnType<typeof gridLines>[number] & { limit: number; ramp: number };

/** A number on each contour, near the middle of the drawing and clear of the others. */
function contourNumbers(lines: Line[], frame: Box, marks: Box[]) {
  const taken = [...marks];
  const width = frame.right - frame.left;
  return lines.flatMap((line) => {
    for (const share of [0.55, 0.4, 0.7, 0.25, 0.85]) {
      const place = labelPoint(line, frame.left + share * width, frame, taken);
      if (!place) continue;
      taken.push(place.box);
      return [{ ...line, ...place }];
    }
    return [];
  });
}
