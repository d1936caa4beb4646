/** The completeness ramp with its ends: 20 bands of 5 %. */
export function RampKey({ label }: { label: string }) {
  return (
    <span className="inline-flex flex-wrap items-start gap-x-2.5 text-chart text-ink3">
      {label}
      <svg
        className="chart mt-[3px]"
        width="156"
        height="30"
        viewBox="-3 0 156 30"
        role="img"
        aria-label="Colour scale from 0 to 100 per cent in bands of 5"
      >
        {Array.from({ length: 20 }, (_, band) => band).map((band) => (
          <rect key={band} x={band * 7.5} y="0" width="8" height="10" fill={`var(--q${band})`} />
        ))}
        <text x="0" y="25">
          0
        </text>
        <text x="75" y="25" textAnchor="middle">
          50
        </text>
        <text x="150" y="25" textAnchor="end">
          100{'\u2009'}%
        </text>
      </svg>
    </span>
  );
}
