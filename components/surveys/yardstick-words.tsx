import { JupiterMass } from '@/components/ui/notation';
import { formatRange, THIN_SPACE } from '@/lib/quantities/display';
import type { YardstickView } from '@/lib/schemas/yardstick';

type Ranges = Pick<
  YardstickView,
  'massMinMjup' | 'massMaxMjup' | 'semiMajorAxisMinAu' | 'semiMajorAxisMaxAu'
>;

/** "2–30 M_J, 20–300 AU", each range unbroken. */
export function RangesWords({ ranges }: { ranges: Ranges }) {
  return (
    <>
      <span className="whitespace-nowrap">
        {formatRange(ranges.massMinMjup, ranges.massMaxMjup, '')}
        {THIN_SPACE}
        <JupiterMass />,
      </span>{' '}
      <span className="whitespace-nowrap">
        {formatRange(ranges.semiMajorAxisMinAu, ranges.semiMajorAxisMaxAu, 'AU')}
      </span>
    </>
  );
}

/** Whose ranges they are: "as A-1 asks", "as P-2 has them". */
export function yardstickSource({ analysis, key }: YardstickView): string {
  if (analysis !== null) return `as ${analysis} asks`;
  return key === null ? 'flat in both logarithms' : `as ${key} has them`;
}

/** What a detection probability is averaged over: "2–30 M_J, 20–300 AU, as A-1 asks". */
export function YardstickWords({ yardstick }: { yardstick: YardstickView }) {
  return (
    <>
      <RangesWords ranges={yardstick} />, {yardstickSource(yardstick)}
    </>
  );
}

/** The same below the head of a column, no wider than the head. */
export function YardstickLines({ yardstick }: { yardstick: YardstickView | null | undefined }) {
  if (!yardstick) return null;
  return (
    <span className="ml-auto block w-min text-[12px] leading-tight max-md:whitespace-normal md:w-max">
      <RangesWords ranges={yardstick} />,{' '}
      <span className="block">{yardstickSource(yardstick)}</span>
    </span>
  );
}
