import type { SensitivitySettings, StellarCompanion, UnvettedCandidate } from '@/lib/sensitivity';
import { CompanionRow, type ContrastCurveRow, type TargetRow } from './index';
import { MissingInput } from './missing-input';

/** A target's curve with the entry whose magnitudes go with it. */
export interface OwnCurve {
  target: TargetRow;
  curve: ContrastCurveRow;
}

/** What a query of targets includes so that their open candidates come with them. */
export const openCandidates = () => ({
  model: CompanionRow,
  as: 'companions',
  required: false,
  where: { status: ['candidate', 'ambiguous'] },
});

function candidateRowsOf(target: TargetRow): CompanionRow[] {
  const { companions } = target as TargetRow & { companions?: CompanionRow[] };
  if (!companions) throw new Error(`the candidates of ${target.name} were not read`);
  return companions;
}

const numberIn = (attributes: Record<string, unknown>, name: string): number | undefined => {
  const value = attributes[name];
  return typeof value === 'number' ? value : undefined;
};

/** Angular separation as measured, or from the projected one and the star's distance. */
function separationOf(target: TargetRow, { attributes }: CompanionRow): number | undefined {
  const measured = numberIn(attributes, 'separationArcsec');
  if (measured !== undefined) return measured;
  const projectedAu = numberIn(attributes, 'projectedSeparationAu');
  const { distancePc, parallaxMas } = target;
  if (projectedAu === undefined) return undefined;
  if (distancePc !== null) return projectedAu / distancePc;
  return parallaxMas === null ? undefined : (projectedAu * parallaxMas) / 1000;
}

/**
 * Candidates without an answer of a star, by separation. A contrast without a band holds for a star
 * whose curves are all in one band, and for no curve otherwise.
 */
export function candidatesOf(targets: TargetRow[], bands: string[]): UnvettedCandidate[] {
  const isOneBand = new Set(bands).size === 1;
  const found = targets.flatMap((target) =>
    candidateRowsOf(target).flatMap((row): UnvettedCandidate[] => {
      const separationArcsec = separationOf(target, row);
      if (separationArcsec === undefined) return [];
      const contrastMag = numberIn(row.attributes, 'contrastMag');
      const { band } = row.attributes;
      if (contrastMag === undefined) return [{ separationArcsec }];
      if (typeof band === 'string') return [{ separationArcsec, contrastMag, band }];
      return [isOneBand ? { separationArcsec, contrastMag } : { separationArcsec }];
    }),
  );
  const brightness = (one: UnvettedCandidate) => one.contrastMag ?? -1;
  return found.sort(
    (a, b) => a.separationArcsec - b.separationArcsec || brightness(a) - brightness(b),
  );
}

/** The orbit of a star's stellar companion where all of it is listed. */
export function stellarCompanionOf({ attributes }: TargetRow): StellarCompanion | undefined {
  const semiMajorAxisAu = numberIn(attributes, 'binarySemiMajorAxisAu');
  const eccentricity = numberIn(attributes, 'binaryEccentricity');
  const massRatio = numberIn(attributes, 'binaryMassRatio');
  if (semiMajorAxisAu === undefined || eccentricity === undefined || massRatio === undefined) {
    return undefined;
  }
  return { semiMajorAxisAu, eccentricity, massRatio };
}

export const membershipOf = ({ attributes }: TargetRow): number | undefined =>
  numberIn(attributes, 'membershipProbability');

/**
 * Refuses a star of which a rule would have to guess.
 *
 * @throws MissingInput for a candidate without a place where candidates are cut, or a stellar
 *   companion with half an orbit where its zone is removed
 */
export function requireFacts(ownCurves: OwnCurve[], settings: SensitivitySettings): void {
  for (const target of new Set(ownCurves.map((own) => own.target))) {
    if (settings.candidates) {
      const lost = candidateRowsOf(target).find((row) => separationOf(target, row) === undefined);
      if (lost) {
        throw new MissingInput(
          `No separation of candidate ${lost.name}: the curve cannot be cut where it lies`,
        );
      }
    }
    const isListed = numberIn(target.attributes, 'binarySemiMajorAxisAu') !== undefined;
    if (settings.unstableZone && isListed && !stellarCompanionOf(target)) {
      throw new MissingInput(
        'No eccentricity or mass ratio of the stellar companion: its unstable zone needs both',
      );
    }
  }
}
