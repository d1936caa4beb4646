import { BottomAxis, JupiterMassText, LeftAxis } from './axes';
import type { Box, MapData } from './map-contours';
import { scaleLog } from './scales';
import { logTicks } from './ticks';

export interface MapFrame extends Box {
  x(semiMajorAxisAu: number): number;
  y(massMjup: number): number;
  invertX(px: number): number;
  invertY(px: number): number;
}

/** Frame of a drawing over semi-major axis and mass, both logarithmic, mass upwards. */
export function mapFrame(map: MapData, width: number, height: number, margin: Box): MapFrame {
  const box = {
    left: margin.left,
    right: width - margin.right,
    top: margin.top,
    bottom: height - margin.bottom,
  };
  const ends = (values: Float64Array): [number, number] => [values[0], values[values.length - 1]];
  const x = scaleLog(ends(map.semiMajorAxisAu), [box.left, box.right]);
  const y = scaleLog(ends(map.massMjup), [box.bottom, box.top]);
  return { ...box, x, y, invertX: (px) => x.invert(px), invertY: (px) => y.invert(px) };
}

/** Both axes of a map. */
export function MapAxes({ map, frame }: { map: MapData; frame: MapFrame }) {
  const [au, mass] = [map.semiMajorAxisAu, map.massMjup];
  return (
    <>
      <BottomAxis
        ticks={logTicks(au[0], au[au.length - 1], frame.right - frame.left)}
        scale={frame.x}
        y={frame.bottom}
        x0={frame.left}
        x1={frame.right}
        name="semi-major axis, AU"
      />
      <LeftAxis
        ticks={logTicks(mass[0], mass[mass.length - 1], (frame.bottom - frame.top) * 1.2)}
        scale={frame.y}
        x={frame.left}
        y0={frame.bottom}
        y1={frame.top}
        nameClassName="page-halo-thin"
        name={
          <>
            planet mass, <JupiterMassText />
          </>
        }
      />
    </>
  );
}
