import type { Fault } from '@/lib/errors';

/** The library's own words for what a schema says nothing of. */
const bounds: [RegExp, string][] = [
  [/>=\s*([\d.]+)/, 'at least'],
  [/<=\s*([\d.]+)/, 'at most'],
  [/>\s*([\d.]+)/, 'more than'],
  [/<\s*([\d.]+)/, 'less than'],
];

/** What the form wants in this field, from the words of its schema. */
export function wantedWords(message: string): string {
  if (/^Too (small|big)/.test(message)) {
    for (const [pattern, words] of bounds) {
      const found = pattern.exec(message);
      if (found) return `Expected ${words} ${found[1]}`;
    }
  }
  if (/expected (number|int)/.test(message)) return 'Expected a number';
  if (/^(Invalid|Too|Unrecognized|Expected|Required)/.test(message)) {
    return 'Expected something else here';
  }
  const [wanted, hint] = message.split('; ', 2);
  return hint === undefined ? `Expected ${wanted}` : `Expected ${wanted}: ${hint}`;
}

/** What the server found in this field and expected. */
export function faultWords({ found, expected, hint, message }: Fault): string {
  const parts = [expected && `Expected ${expected}`, found && `found ${found}`].filter(Boolean);
  return [message ?? parts.join(', '), hint].filter(Boolean).join('. ');
}
