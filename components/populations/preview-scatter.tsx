'use client';

import { CompanionScatter, type DrawnCompanions } from '@/components/charts/companion-scatter';
import type { MapData } from '@/components/charts/map-contours';
import { SectionOpener } from '@/components/ui/section-opener';
import { SeriesKey } from '@/components/ui/series-key';
import type { Population, PopulationBox } from '@/lib/population';
import type { Margins } from './margins';
import type { Spread } from './spread';

interface PreviewScatterProps {
  population: Population;
  planets: DrawnCompanions;
  spread: Spread;
  margins: Margins | null;
  subject: string;
  source: string;
  onRange?: (range: PopulationBox, isSettled: boolean) => void;
}

/** Companions of a population over the mean map, with the margins of all and of those seen. */
export function PreviewScatter(props: PreviewScatterProps) {
  const { population, planets, spread, margins, subject, source, onRange } = props;
  const shown = planets.massMjup.length;
  const seen = planets.isSeen.reduce((sum, value) => sum + value, 0);
  const isWhole = population.form === 'systems' && shown === population.massMjup.length;
  const frame = frameOf(spread.map);
  const range = within(spread.box, frame);
  const inside = onMap(planets, frame);
  const beyond = shown - inside.massMjup.length;
  const title = isWhole
    ? `All ${shown} companions of the table`
    : `${shown} ${population.form === 'systems' ? 'companions' : 'planets'} drawn from it`;
  return (
    <section>
      <SectionOpener
        title={title}
        help="population"
        context={`over the ${subject}, from ${source}`}
        tools={
          <>
            <SeriesKey shape="dot" colour="var(--ink)">
              seen, {seen}
            </SeriesKey>
            <SeriesKey shape="ring" colour="var(--ink)">
              missed, {shown - seen}
            </SeriesKey>
          </>
        }
      />
      <CompanionScatter
        map={spread.map}
        subject={subject}
        companions={inside}
        range={range}
        onRangeChange={
          onRange && ((next, isSettled) => onRange(moved(spread.box, range, next), isSettled))
        }
        massMargin={margins?.mass}
        semiMajorAxisMargin={margins?.semiMajorAxis}
      />
      {beyond > 0 && (
        <p className="mt-1 text-chart text-ink3">
          {beyond} of them {beyond === 1 ? 'lies' : 'lie'} beyond the map and cannot be seen.
        </p>
      )}
      {population.form === 'mass-ratio' && (
        <p className="mt-1 text-chart text-ink3">
          Each planet on a star of the surveys, seen with that star’s own map; the box holds the
          ranges of all of them.
        </p>
      )}
      {population.form === 'systems' && (
        <p className="mt-1 text-chart text-ink3">
          Filled ones would be seen, with the mean completeness at their place. The margins count
          companions by the weight of their systems.
        </p>
      )}
    </section>
  );
}

const ends = (nodes: Float64Array) => [nodes[0], nodes[nodes.length - 1]] as const;

function frameOf(map: MapData): PopulationBox {
  const [massMinMjup, massMaxMjup] = ends(map.massMjup);
  const [semiMajorAxisMinAu, semiMajorAxisMaxAu] = ends(map.semiMajorAxisAu);
  return { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu };
}

/** The part of a box that lies in the frame of the map. */
function within(box: PopulationBox, frame: PopulationBox): PopulationBox {
  const clamp = (value: number, min: number, max: number) => Math.min(max, Math.max(min, value));
  const mass = (value: number) => clamp(value, frame.massMinMjup, frame.massMaxMjup);
  const axis = (value: number) => clamp(value, frame.semiMajorAxisMinAu, frame.semiMajorAxisMaxAu);
  return {
    massMinMjup: mass(box.massMinMjup),
    massMaxMjup: mass(box.massMaxMjup),
    semiMajorAxisMinAu: axis(box.semiMajorAxisMinAu),
    semiMajorAxisMaxAu: axis(box.semiMajorAxisMaxAu),
  };
}

/** The box after a handle was moved: ends that lie beyond the map and were not moved stay there. */
function moved(box: PopulationBox, shown: PopulationBox, next: PopulationBox): PopulationBox {
  const keys = ['massMinMjup', 'massMaxMjup', 'semiMajorAxisMinAu', 'semiMajorAxisMaxAu'] as const;
  const result = { ...box };
  for (const key of keys) if (next[key] !== shown[key]) result[key] = next[key];
  return result;
}

function onMap(planets: DrawnCompanions, frame: PopulationBox): DrawnCompanions {
  const kept = Array.from(planets.massMjup.keys()).filter((i) => {
    const [mass, axis] = [planets.massMjup[i], planets.semiMajorAxisAu[i]];
    return (
      mass >= frame.massMinMjup &&
      mass <= frame.massMaxMjup &&
      axis >= frame.semiMajorAxisMinAu &&
      axis <= frame.semiMajorAxisMaxAu
    );
  });
  return {
    massMjup: Float64Array.from(kept, (i) => planets.massMjup[i]),
    semiMajorAxisAu: Float64Array.from(kept, (i) => planets.semiMajorAxisAu[i]),
    isSeen: Uint8Array.from(kept, (i) => planets.isSeen[i]),
  };
}
