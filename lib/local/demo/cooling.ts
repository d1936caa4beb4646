/**
 * Absolute magnitude of the demonstration's invented cooling: it falls by a fixed slope per decade of
 * mass and rises with age, faster in the bluer band.
 *
 * @param shift makes a second start model fainter while young
 */
export function inventedMagnitude(
  massMjup: number,
  ageMyr: number,
  band: 'H' | 'K' | 'L',
  shift = 0,
): number {
  const logMass = Math.log10(massMjup / 5);
  const logAge = Math.log10(ageMyr / 20);
  const late = shift * Math.exp(-ageMyr / 60) * Math.max(0, 1 + logMass);
  const h = 15.5 - 5.0 * logMass + 3.2 * logAge + late;
  if (band === 'H') return h;
  if (band === 'K') return h - 0.75 - 0.25 * logAge;
  return h - 2.3 - 0.75 * logAge + 0.9 * logMass;
}
