/**
 * Colour of a survey: one of five, the same everywhere; a sixth and later share a grey and are named.
 *
 * @param index place of the survey in the collaboration, from 0
 */
export function seriesColour(index: number): string {
  return index >= 0 && index < 5 ? `var(--s${index + 1})` : 'var(--ink3)';
}

/** Colour of a name written inside a survey's area; s2 and s4 are light in the light theme. */
export function seriesTextColour(index: number): string {
  return index === 1 || index === 3 ? '#0b2326' : 'var(--on-series)';
}
