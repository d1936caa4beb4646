import { listNames } from '@/components/analyses/name-words';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant } from '@/lib/quantities/display';
import { type ComparedInput, type ComparedRun, otherQuestions } from './differences';

/** The comparison as a paragraph, from the same numbers that the screen shows. */
export function compareSentences(sides: ComparedRun[], differing: ComparedInput[]): string {
  const limit = ({ result }: ComparedRun) =>
    result.answer.isConstrained
      ? `${formatLimit(result.answer.limit, result.quantity)} (${describeLevel(result.credibleLevel)})`
      : 'no limit';
  const opening = `${listNames(sides.map((side) => `${side.name} gives ${limit(side)}`))}.`;
  if (differing.length === 0) return `${opening} They were made from the same inputs.`;
  const changes = differing.map(
    ({ name, values }) =>
      `${name.replace(' α', '').replace(' β', '').toLowerCase()} (${values.join(values.length === 2 ? ' against ' : ', ')})`,
  );
  const warning = otherQuestions(differing);
  return [
    opening,
    ...(warning === undefined ? [] : [warning]),
    ...ratios(sides),
    `They differ in ${listNames(changes)}.`,
  ].join(' ');
}

/** Ratios to the first side, where both answer for the same quantity. */
function ratios([first, ...others]: ComparedRun[]): string[] {
  const said = others.flatMap((other) => {
    const ratio = other.result.answer.limit / first.result.answer.limit;
    return other.result.quantity === first.result.quantity && Number.isFinite(ratio)
      ? [`that of ${other.name} is ${formatSignificant(ratio, 2)} times`]
      : [];
  });
  return said.length === 0
    ? []
    : [`Beside the limit of ${first.name}, ${listNames(said)} as high.`];
}

export function titleOf(sides: ComparedRun[]): string {
  const [a, b] = sides;
  if (sides.length === 2) {
    const [first, second] = [a.result.counted.length, b.result.counted.length];
    if (first > 0 && second === 0 && b.recipe.detections === 'none') {
      return `With ${first === 1 ? 'one detection' : `${first} detections`} and with none`;
    }
  }
  return listNames(sides.map(({ name }) => name));
}
