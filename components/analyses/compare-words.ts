import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant } from '@/lib/quantities/display';
import type { ComparedInput, ComparedRun } from './compare-differences';
import { listNames } from './name-words';

/** The comparison as a paragraph, from the same numbers that the screen shows. */
export function compareSentences(
  a: ComparedRun,
  b: ComparedRun,
  differing: ComparedInput[],
): string {
  const limit = ({ result }: ComparedRun) =>
    `${formatLimit(result.answer.limit, result.quantity)} (${describeLevel(result.credibleLevel)})`;
  const opening = `${a.key} gives ${limit(a)}, ${b.key} gives ${limit(b)}.`;
  if (differing.length === 0) {
    return `${opening} The two were made from the same inputs.`;
  }
  const changes = differing.map(
    (row) =>
      `${row.name.replace(' α', '').replace(' β', '').toLowerCase()} (${row.a} against ${row.b})`,
  );
  const ratio = a.result.answer.limit / b.result.answer.limit;
  const factor =
    a.result.quantity === b.result.quantity && Number.isFinite(ratio)
      ? ` The limit of ${a.key} is ${formatSignificant(ratio, 2)} times that of ${b.key}.`
      : '';
  return `${opening}${factor} They differ in ${listNames(changes)}.`;
}
