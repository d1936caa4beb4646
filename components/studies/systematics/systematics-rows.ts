import type { ChangeRow } from '@/components/charts/change-rows-chart';
import type { RateQuantity } from '@/lib/quantities/display';
import type { ResultOf } from '@/lib/schemas/study-results';
import { limitDifference, ratioInWords } from '../limit-difference';
import { keyOf } from './changes-offered';

type Result = ResultOf<'systematics'>;
type Row = Result['rows'][number];
type Answered = Row & { limit: number; ratio: number };

const isAnswered = (row: Row): row is Answered => row.limit !== null && row.ratio !== null;
const spanOf = ({ ratio }: Answered) => Math.abs(Math.log(ratio));

/** Rows that have a limit, the largest move first, and those that have none. */
export function sortRows(rows: Row[]): { answered: Answered[]; faulty: Row[] } {
  const answered = rows
    .filter(isAnswered)
    .sort((a, b) => spanOf(b) - spanOf(a) || a.label.localeCompare(b.label, 'en'));
  return { answered, faulty: rows.filter((row) => !isAnswered(row)) };
}

/** "3 of 287 stars keep their map". */
export function unchangedInWords(count: number, stars: number): string | undefined {
  if (count === 0) return undefined;
  if (count >= stars) return 'leaves every map as it is';
  return `${count} of ${stars} stars keep ${count === 1 ? 'its' : 'their'} map`;
}

export function changeRows(
  answered: Answered[],
  { baseline }: Result,
  stars: number,
  quantity: RateQuantity,
): ChangeRow[] {
  return answered.map((row) => ({
    key: keyOf(row.change),
    name: row.label,
    limit: row.limit,
    difference: limitDifference(row.limit, baseline, quantity),
    ratio: ratioInWords(row.ratio),
    note: unchangedInWords(row.starsUnchanged, stars),
  }));
}
