import type { FaultReport } from './reports';
import { quoteFound } from './reports';

const expected = 'a list such as 1,3,10, linspace(a,b,n) or geomspace(a,b,n)';
const span = /^(linspace|geomspace)\(([^,()]+),([^,()]+),(\d{1,4})\)$/;

/**
 * An axis that is given with a file that has none: a list of numbers, `linspace(a,b,n)` or
 * `geomspace(a,b,n)` with both ends.
 */
export function parseAxisText(text: string, name: string, faults: FaultReport): number[] | null {
  const compact = text.replace(/\s+/g, '').replace(/^\[|\]$/g, '');
  const match = span.exec(compact);
  const values = match
    ? spread(match[1], Number(match[2]), Number(match[3]), Number(match[4]))
    : compact.split(',').map((part) => (part === '' ? Number.NaN : Number(part)));
  if (values.length > 0 && values.every(Number.isFinite)) return values;
  faults.add({ code: 'axis-text', item: name, found: quoteFound(text), expected });
  return null;
}

function spread(kind: string, from: number, to: number, count: number): number[] {
  const steps = Math.max(count - 1, 1);
  const at = (i: number) => (i === steps ? to : from + ((to - from) * i) / steps);
  if (kind === 'linspace') return Array.from({ length: count }, (_, i) => at(i));
  const ratio = to / from;
  return Array.from({ length: count }, (_, i) => (i === steps ? to : from * ratio ** (i / steps)));
}
