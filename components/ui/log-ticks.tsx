const fractions = [1, 2, 3, 4, 5, 6, 7, 8, 9].map((digit) => Math.log10(digit));

/** Ticks of `decades` decades hanging from a rule, in a box of `unitsWide` user units. */
function ticks(decades: number, unitsWide: number, long: number, middle: number, short: number) {
  const decade = unitsWide / decades;
  return Array.from({ length: decades }, (_, index) =>
    fractions.map((fraction, digit) => ({
      x: (index + fraction) * decade,
      length: digit === 0 ? long : digit === 4 ? middle : short,
    })),
  ).flat();
}

/** One decade under the left end of a section opener. */
export function LogTicks() {
  return (
    <svg
      className="log-ticks absolute top-0 left-0 block"
      width="120"
      height="9"
      viewBox="0 0 120 9"
      aria-hidden="true"
    >
      {[...ticks(1, 120, 8, 5.5, 4), { x: 119.5, length: 8 }].map(({ x, length }) => (
        <line key={x} x1={x} x2={x} y1="0" y2={length} />
      ))}
    </svg>
  );
}

/** Four decades under the top bar, over the whole width. */
export function Ruler() {
  return (
    <div className="h-[9px] overflow-hidden border-t border-rule2" aria-hidden="true">
      <svg
        className="log-ticks block"
        width="100%"
        height="8"
        viewBox="0 0 1440 8"
        preserveAspectRatio="none"
        aria-hidden="true"
      >
        {ticks(4, 1440, 7, 3.5, 3.5).map(({ x, length }) => (
          <line key={x} x1={x} x2={x} y1="0" y2={length} />
        ))}
      </svg>
    </div>
  );
}
