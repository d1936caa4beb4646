/** M with a lowered J: the mass of Jupiter. */
export function JupiterMass() {
  return (
    <span className="whitespace-nowrap">
      <span aria-hidden="true">
        M<sub>J</sub>
      </span>
      <span className="sr-only">Jupiter masses</span>
    </span>
  );
}

/** The sign is in no file of the typeface, so it is drawn. */
export function ProportionalTo() {
  return (
    <svg
      className="mx-[0.28em] inline"
      width="11"
      height="8"
      viewBox="0 0 11 8"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.1"
      role="img"
      aria-label="proportional to"
    >
      <path d="M10.6 1.2C8.2 1 6.8 2.4 5.6 4 4.6 5.4 3.9 6.8 2.7 6.8 1.4 6.8.7 5.6.7 4S1.4 1.2 2.7 1.2c1.2 0 1.9 1.4 2.9 2.8 1.2 1.6 2.6 3 5 2.8" />
    </svg>
  );
}

/** A limit as it stands in text and tables: "<5.8 %" in the colour of the bound. */
export function Limit({ children }: { children: string }) {
  return <span className="limit">{children}</span>;
}
