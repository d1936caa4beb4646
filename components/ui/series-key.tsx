import type { ReactNode } from 'react';

/** A colour and its name, for marks that cannot carry the name themselves. */
export function SeriesKey({
  colour,
  shape = 'square',
  children,
}: {
  /** A CSS colour, from `seriesColour`. */
  colour: string;
  shape?: 'square' | 'dot' | 'ring';
  children: ReactNode;
}) {
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap text-ink2 text-note">
      <span
        aria-hidden="true"
        className={`size-[11px] ${shape === 'square' ? '' : 'rounded-full'}`}
        style={shape === 'ring' ? { border: `1.4px solid ${colour}` } : { backgroundColor: colour }}
      />
      {children}
    </span>
  );
}
