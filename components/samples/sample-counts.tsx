'use client';

import { SelectionChart } from '@/components/charts/selection-chart';
import { FactsStrip } from '@/components/ui/facts-strip';
import type { SamplePreview } from '@/lib/schemas/samples';

const entryWords = (count: number) => (count === 1 ? '1 entry' : `${count} entries`);

/** What a selection holds now: counts, what keeps entries out, and how its stars are spread. */
export function SampleCounts({ preview, isOld }: { preview: SamplePreview; isOld: boolean }) {
  const { stars, entries, leftOut, ageMyr, distancePc, spectralTypes } = preview;
  return (
    <div className={isOld ? 'opacity-60' : ''} aria-busy={isOld}>
      <p className="mb-3 text-ink2">{preview.words}.</p>
      <div aria-live="polite">
        <FactsStrip
          facts={[
            { name: 'stars', value: stars.selected, note: `of ${stars.all}` },
            { name: 'entries', value: entries.selected, note: `of ${entries.all}` },
          ]}
        />
      </div>
      {leftOut.length > 0 && (
        <p className="mb-4 text-ink2 text-note">
          Out, by the first thing that keeps them out:{' '}
          {leftOut
            .map(({ reason, entries: count }) => `${reason}, ${entryWords(count)}`)
            .join('; ')}
          .
        </p>
      )}
      <div className="grid gap-x-8 gap-y-5 sm:grid-cols-2">
        {ageMyr && (
          <SelectionChart name="age, Myr" bars={{ edges: ageMyr.edges }} {...countsOf(ageMyr)} />
        )}
        {distancePc && (
          <SelectionChart
            name="distance, pc"
            bars={{ edges: distancePc.edges }}
            {...countsOf(distancePc)}
          />
        )}
        {spectralTypes.length > 0 && (
          <SelectionChart
            name="spectral type"
            bars={{ names: spectralTypes.map(({ type }) => (type === 'not known' ? '?' : type)) }}
            all={spectralTypes.map(({ all }) => all)}
            selected={spectralTypes.map(({ selected }) => selected)}
          />
        )}
      </div>
      <p className="mt-2 text-chart text-ink3">
        Pale: all stars; solid: selected.
        {unknownWords('age', ageMyr)}
        {unknownWords('distance', distancePc)}
        {spectralTypes.some(({ type }) => type === 'not known') && ' ?: type not known.'}
      </p>
    </div>
  );
}

const countsOf = ({ all, selected }: { all: number[]; selected: number[] }) => ({ all, selected });

function unknownWords(name: string, histogram: SamplePreview['ageMyr']): string {
  const count = histogram?.unknown.all ?? 0;
  if (count === 0) return '';
  return ` Without ${name}, not drawn: ${count === 1 ? '1 star' : `${count} stars`}.`;
}
