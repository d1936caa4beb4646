/** Modified Julian Dates of 1900-01-01 and 2100-01-01: a bare year or 20140501 is neither. */
const mjdRange = [15_020, 88_069] as const;

export type DateReading = { value: string } | { problem: 'no-date' | 'unknown-form' };

function isCalendarDate(year: number, month: number, day: number): boolean {
  const date = new Date(Date.UTC(year, month - 1, day));
  return date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
}

/** Reads `2014-05-01` or a Modified Julian Date; the text is kept as written. */
export function readDate(text: string): DateReading {
  const trimmed = text.trim();
  const iso = /^(\d{4})-(\d{2})-(\d{2})$/.exec(trimmed);
  if (iso !== null) {
    const [year, month, day] = iso.slice(1).map(Number);
    if (year >= 1800 && isCalendarDate(year, month, day)) return { value: trimmed };
    return { problem: 'no-date' };
  }
  if (/^\d{5}(\.\d*)?$/.test(trimmed)) {
    const mjd = Number(trimmed);
    if (mjd >= mjdRange[0] && mjd <= mjdRange[1]) return { value: trimmed };
  }
  return { problem: 'unknown-form' };
}
