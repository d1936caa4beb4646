import { ProbabilityBar } from '@/components/charts/probability-bar';
import { YardstickLines } from '@/components/surveys/yardstick-words';
import type { DataColumn } from '@/components/ui/data-table/column';
import type { YardstickView } from '@/lib/schemas/yardstick';

/** The detection probability of each row, as a bar and in percent; a dash where there is no map. */
export function probabilityColumn<Row extends { probability: number | null }>(
  yardstick: YardstickView | null,
  /** Which of several maps a row shows: "of the survey that sees most". */
  which?: string,
): DataColumn<Row> {
  return {
    id: 'seen',
    head: (
      <>
        <span className="max-md:hidden">detection probability</span>
        <span className="md:hidden">seen</span>
        <YardstickLines yardstick={yardstick} />
        {which !== undefined && (
          <span className="ml-auto block w-min text-[12px] leading-tight max-md:whitespace-normal md:w-max">
            {which}
          </span>
        )}
      </>
    ),
    name: 'detection probability',
    isNumeric: true,
    value: ({ probability }) => probability,
    cell: ({ probability }) =>
      probability === null ? (
        '–'
      ) : (
        <span className="inline-flex items-center gap-2.5">
          <span className="max-md:hidden">
            <ProbabilityBar value={probability} />
          </span>
          <span className="min-w-11">{`${Math.round(100 * probability)}\u2009%`}</span>
        </span>
      ),
  };
}
