/** Where a drawing is being read: a hairline and a dot on each curve; files leave it behind. */
export function CursorMarks({
  x,
  top,
  bottom,
  ys = [],
}: {
  x: number;
  top: number;
  bottom: number;
  /** Places on the curves [px]. */
  ys?: number[];
}) {
  return (
    <g data-screen-only="" pointerEvents="none">
      <line className="cursor-line" x1={x} x2={x} y1={top} y2={bottom} />
      {ys.filter(Number.isFinite).map((y) => (
        <circle key={y} className="cursor-dot" cx={x} cy={y} r="4" />
      ))}
    </g>
  );
}

/** A node of a field that is being read. */
export function CursorRing({ x, y }: { x: number; y: number }) {
  return ['cursor-edge', 'cursor-ring'].map((ring) => (
    <circle key={ring} data-screen-only="" className={ring} cx={x} cy={y} r="6" />
  ));
}
