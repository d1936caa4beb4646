const SHAPE = /^(?:https?:\/\/orcid\.org\/)?(\d{4})-?(\d{4})-?(\d{4})-?(\d{3}[\dX])$/i;

/**
 * The last character of an ORCID iD, by ISO 7064 MOD 11-2 over the fifteen digits before it.
 *
 * @source ISO/IEC 7064:2003, the pure system MOD 11-2
 */
export function orcidCheckCharacter(digits: string): string {
  let total = 0;
  for (const digit of digits) total = (total + Number(digit)) * 2;
  const check = (12 - (total % 11)) % 11;
  return check === 10 ? 'X' : String(check);
}

/** An iD as it is written, such as 0000-0002-1825-0097; null where it is none. */
export function readOrcid(text: string): string | null {
  const found = SHAPE.exec(text.trim());
  if (!found) return null;
  const blocks = found.slice(1).map((block) => block.toUpperCase());
  const all = blocks.join('');
  return orcidCheckCharacter(all.slice(0, 15)) === all[15] ? blocks.join('-') : null;
}
