/**
 * Rough width of a line in Source Sans 3 [px]: every digit, minus and `<` is 0.497 em wide and the
 * letters average to the same, capitals more; enough to decide whether a label fits.
 */
export function textWidth(text: string, fontSizePx: number): number {
  let ems = 0;
  for (const character of text) {
    if (character === '\u2009') ems += 0.2;
    else if (/[ .,:;'il|()]/.test(character)) ems += 0.27;
    else if (/[A-ZM%mw]/.test(character)) ems += 0.64;
    else ems += 0.5;
  }
  return ems * fontSizePx;
}
