export interface Change {
  /** Empty where the entry is about one value. */
  name: string;
  before: string | null;
  after: string | null;
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

function wordsOf(value: unknown): string | null {
  if (value === undefined || value === null || value === '') return null;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (Array.isArray(value)) return value.map((one) => wordsOf(one) ?? '–').join(', ') || null;
  return isRecord(value) ? JSON.stringify(value) : String(value);
}

/** "needsTwoPeople" → "needs two people". */
const nameWords = (key: string) => key.replace(/([A-Z])/g, (letter) => ` ${letter.toLowerCase()}`);

/** What an entry of the log says of values before and after, value by value. */
export function changesOf(details: Record<string, unknown>): Change[] {
  const { before, after } = details;
  if (before === undefined && after === undefined) return [];
  if (!isRecord(before) || !isRecord(after)) {
    return [{ name: '', before: wordsOf(before), after: wordsOf(after) }];
  }
  const keys = [...new Set([...Object.keys(before), ...Object.keys(after)])];
  return keys.map((key) => ({
    name: nameWords(key),
    before: wordsOf(before[key]),
    after: wordsOf(after[key]),
  }));
}
