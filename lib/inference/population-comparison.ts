import { isInside } from '@/lib/population';
import type { PopulationView } from './answer';
import { type EvidenceSettings, type PopulationEvidence, populationEvidence } from './evidence';
import type { MeasuredDetection } from './measured-places';
import { priorLaw } from './priors';

/** A population of a comparison beside the first. */
export interface ComparedPopulation extends PopulationEvidence {
  name: string;
  /**
   * ln of its evidence over that of the first: above 0 where it is favoured. Null where either has
   * none, or both are zero.
   */
  logBayesFactor: number | null;
  /** S [stars]. */
  exposure: number;
  /** Detections inside its ranges. */
  detections: number;
}

export interface PopulationComparison {
  rows: ComparedPopulation[];
  /** What every population had to explain. */
  explained: MeasuredDetection[];
  /** Inside no population's ranges, or further companions of a star that counts once. */
  setAside: MeasuredDetection[];
  /** Support of the rate's prior, which the factors depend on. */
  priorRange: [number, number];
  notes: string[];
}

/** Data that all populations share: what lies in the ranges of any of them, a star once for f. */
function sharedDetections(
  views: readonly PopulationView[],
  { likelihood, detections }: EvidenceSettings,
) {
  const explained: MeasuredDetection[] = [];
  const setAside: MeasuredDetection[] = [];
  const seen = new Set<number>();
  for (const detection of detections) {
    const { star, massMjup, semiMajorAxisAu } = detection;
    const isInAny = views.some(({ population, hostMassMsun }) =>
      isInside(population, massMjup, semiMajorAxisAu, hostMassMsun?.[star]),
    );
    const isFurther = likelihood === 'host-fraction' && seen.has(star);
    (isInAny && !isFurther ? explained : setAside).push(detection);
    if (isInAny) seen.add(star);
  }
  return { explained, setAside };
}

function factorOf(own: number | null, first: number | null): number | null {
  if (own === null || first === null) return null;
  const factor = own - first;
  return Number.isNaN(factor) ? null : factor;
}

function describeSamples(detections: readonly MeasuredDetection[]): string[] {
  return detections.some(({ measurement }) => measurement?.kind === 'samples')
    ? ['A measurement is given by samples: evidences hold up to a factor that all of them share.']
    : [];
}

/**
 * Weighs populations against the first with the same data and prior of the rate.
 *
 * A detection that lies in the ranges of one population must be explained by all: where it lies
 * outside, the evidence is zero and the row says why.
 *
 * @param populations name and view, the first being the one that the others are held against
 * @param settings likelihood, prior and every vetted companion of the sample
 * @throws RangeError for no population, and as `populationEvidence`
 * @source Kass & Raftery 1995, J. Am. Stat. Assoc. 90, 773
 */
export function comparePopulations(
  populations: readonly { name: string; view: PopulationView }[],
  settings: EvidenceSettings,
): PopulationComparison {
  if (populations.length === 0) throw new RangeError('there is no population to weigh');
  const views = populations.map(({ view }) => view);
  const { explained, setAside } = sharedDetections(views, settings);
  const evidences = views.map((view) =>
    populationEvidence(view, { ...settings, detections: explained }),
  );
  const rows = populations.map(({ name, view }, at) => ({
    ...evidences[at],
    name,
    logBayesFactor: factorOf(evidences[at].logEvidence, evidences[0].logEvidence),
    exposure: view.exposure,
    detections: explained.filter(({ star, massMjup, semiMajorAxisAu }) =>
      isInside(view.population, massMjup, semiMajorAxisAu, view.hostMassMsun?.[star]),
    ).length,
  }));
  const first = views[0].completenessPerStar ?? Float64Array.of(views[0].exposure);
  const { support } = priorLaw(settings.prior, settings.likelihood, first);
  return { rows, explained, setAside, priorRange: support, notes: describeSamples(explained) };
}
