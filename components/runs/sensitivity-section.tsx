'use client';

import { useMemo } from 'react';
import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { DepthChart, type DepthSeries } from '@/components/charts/depth-chart';
import type { MapDetection } from '@/components/charts/detection-marks';
import type { MapData } from '@/components/charts/map-contours';
import { RampKey } from '@/components/charts/ramp-key';
import type { MapRange } from '@/components/charts/range-box';
import { FoldSection } from '@/components/ui/fold-section';
import { formatSignificant } from '@/lib/quantities/display';
import type { DetectionView } from '@/lib/schemas/runs';

interface SensitivitySectionProps {
  map: MapData;
  stars: number;
  exposure: number;
  depth: DepthSeries[];
  /** None where the masses in question differ from star to star. */
  range?: MapRange;
  companions: DetectionView[];
  /** Those of them that the limit counts now. */
  counted: { name: string }[];
  /** Given, the range is dragged in the map. */
  onRange?(range: MapRange): void;
}

/** Depth of search by survey over the mean map, on one axis. */
export function SensitivitySection(props: SensitivitySectionProps) {
  const { map, stars, exposure, depth, range, companions, counted, onRange } = props;
  const detections = useMemo(() => {
    const isCounted = new Set(counted.map(({ name }) => name));
    return companions.map((one) => {
      const mark = asMark(one);
      return isCounted.has(one.name) ? mark : { ...mark, name: `${one.name}, not counted` };
    });
  }, [companions, counted]);
  return (
    <FoldSection
      number={2}
      title="Sensitivity"
      help="depth-of-search"
      answer={`${formatSignificant(exposure, 3)} stars’ worth of detection probability`}
      tools={<RampKey label={`mean detection probability, ${stars} stars`} />}
    >
      <div className="grid gap-1">
        <DepthChart semiMajorAxisAu={map.semiMajorAxisAu} series={depth} range={range} />
        <CompletenessMapChart
          map={map}
          subject={`mean detection probability, ${stars} stars`}
          range={range}
          onRangeChange={onRange}
          detections={detections}
        />
      </div>
    </FoldSection>
  );
}

/** A companion as the map marks it; unequal errors are drawn by their mean. */
export function asMark(companion: DetectionView): MapDetection {
  const mean = (errors: [number, number] | null) =>
    errors === null ? undefined : (Math.abs(errors[0]) + Math.abs(errors[1])) / 2;
  return {
    name: companion.name,
    massMjup: companion.massMjup,
    massErrorMjup: mean(companion.massErrorsMjup),
    semiMajorAxisAu: companion.semiMajorAxisAu,
    semiMajorAxisErrorAu: mean(companion.semiMajorAxisErrorsAu),
  };
}
