import { type Box, boxesMeet } from './map-contours';
import type { MapFrame } from './map-frame';
import { textWidth } from './text-width';

export interface MapDetection {
  name: string;
  massMjup: number;
  massErrorMjup?: number;
  semiMajorAxisAu: number;
  semiMajorAxisErrorAu?: number;
  /** Known, but not counted: drawn as an open ring. */
  isAside?: boolean;
}

/**
 * White dots with error bars and names; a name takes the first free place around its dot, one clear
 * of the edges of the range before one that crosses them.
 */
export function DetectionMarks({
  detections,
  frame,
  taken,
  range,
}: {
  detections: MapDetection[];
  frame: MapFrame;
  taken: Box[];
  range?: Box;
}) {
  const places = placeNames(detections, frame, taken, range);
  return detections.map((detection, index) => {
    const x = frame.x(detection.semiMajorAxisAu);
    const y = frame.y(detection.massMjup);
    const place = places[index];
    return (
      <g key={detection.name} className={detection.isAside ? 'detection is-aside' : 'detection'}>
        {detection.semiMajorAxisErrorAu !== undefined && (
          <line
            x1={bar(
              frame.x,
              detection.semiMajorAxisAu,
              -detection.semiMajorAxisErrorAu,
              frame.left,
            )}
            x2={bar(
              frame.x,
              detection.semiMajorAxisAu,
              detection.semiMajorAxisErrorAu,
              frame.right,
            )}
            y1={y}
            y2={y}
          />
        )}
        {detection.massErrorMjup !== undefined && (
          <line
            y1={bar(frame.y, detection.massMjup, -detection.massErrorMjup, frame.bottom)}
            y2={bar(frame.y, detection.massMjup, detection.massErrorMjup, frame.top)}
            x1={x}
            x2={x}
          />
        )}
        {detection.isAside && <circle className="ring-edge" cx={x} cy={y} r="5" />}
        <circle cx={x} cy={y} r="5" />
        <text className="halo" x={place.x} y={place.y} textAnchor={place.anchor}>
          {detection.name}
        </text>
      </g>
    );
  });
}

/** Where each name stands, one after another, clear of what is taken wherever that is possible. */
export function placeNames(
  detections: MapDetection[],
  frame: MapFrame,
  taken: Box[],
  range: Box | undefined,
) {
  const occupied = [...taken];
  const edges = range ? edgesOf(range) : [];
  return detections.map(({ name, semiMajorAxisAu, massMjup }) => {
    const [x, y] = [frame.x(semiMajorAxisAu), frame.y(massMjup)];
    const place = freePlace(name, x, y, frame, occupied, edges);
    occupied.push(place.box, { left: x - 8, right: x + 8, top: y - 8, bottom: y + 8 });
    return place;
  });
}

/** End of an error bar; one that reaches zero on a logarithmic axis runs to its edge. */
function bar(scale: (value: number) => number, value: number, error: number, edge: number) {
  return value + error > 0 ? scale(value + error) : edge;
}

/** The four sides of a box as narrow boxes. */
function edgesOf(box: Box): Box[] {
  return [
    { ...box, left: box.left - 2, right: box.left + 2 },
    { ...box, left: box.right - 2, right: box.right + 2 },
    { ...box, top: box.top - 2, bottom: box.top + 2 },
    { ...box, top: box.bottom - 2, bottom: box.bottom + 2 },
  ];
}

function freePlace(name: string, x: number, y: number, frame: Box, occupied: Box[], edges: Box[]) {
  const width = textWidth(name, 13.5);
  const places = [
    { x, y: y + 24, anchor: 'middle' as const, left: x - width / 2 },
    { x: x - 10, y: y - 11, anchor: 'end' as const, left: x - 10 - width },
    { x: x + 10, y: y - 11, anchor: 'start' as const, left: x + 10 },
    { x, y: y - 16, anchor: 'middle' as const, left: x - width / 2 },
    { x: x + 12, y: y + 18, anchor: 'start' as const, left: x + 12 },
    { x: x - 12, y: y + 18, anchor: 'end' as const, left: x - 12 - width },
    { x: x + 12, y: y + 5, anchor: 'start' as const, left: x + 12 },
    { x: x - 12, y: y + 5, anchor: 'end' as const, left: x - 12 - width },
  ].map((place) => ({
    ...place,
    box: { left: place.left, right: place.left + width, top: place.y - 13, bottom: place.y + 4 },
  }));
  const isClear = (box: Box, marks: Box[]) => !marks.some((mark) => boxesMeet(box, mark));
  const free = places.filter(
    ({ box }) =>
      box.left > frame.left &&
      box.right < frame.right &&
      box.top > frame.top &&
      box.bottom < frame.bottom &&
      isClear(box, occupied),
  );
  return free.find(({ box }) => isClear(box, edges)) ?? free[0] ?? places[0];
}
