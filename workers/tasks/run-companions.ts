import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { isInside, type Population } from '@/lib/population';
import type { DetectionView, RunInputs } from '@/lib/schemas/runs';
import { CompanionRow } from '@/models';
import type { SampleStar } from './run-sample';

export interface MergedCompanions {
  /** Each companion once, by star and then by name. */
  confirmed: DetectionView[];
  undecided: RunInputs['undecided'];
}

/** The most certain verdict of several surveys on one companion holds. */
const CERTAINTY = ['confirmed', 'candidate', 'ambiguous', 'background'] as const;

const pairOf = (lower: number | null, upper: number | null): [number, number] | null =>
  lower === null || upper === null ? null : [lower, upper];

function asDetection(star: SampleStar, rows: CompanionRow[]): DetectionView {
  const measured = rows.find((row) => row.massMjup !== null && row.semiMajorAxisAu !== null);
  if (!measured) {
    throw new InputError({
      code: 'no-companion-mass',
      message: `The confirmed companion ${rows[0].name} of ${star.name} has no mass or no semi-major axis; expected both`,
    });
  }
  return {
    companionIds: rows.map((row) => row.id).sort(),
    name: `${star.name} ${measured.name}`,
    starId: star.starId,
    star: star.name,
    massMjup: measured.massMjup as number,
    massErrorsMjup: pairOf(measured.massErrorLowerMjup, measured.massErrorUpperMjup),
    semiMajorAxisAu: measured.semiMajorAxisAu as number,
    semiMajorAxisErrorsAu: pairOf(
      measured.semiMajorAxisErrorLowerAu,
      measured.semiMajorAxisErrorUpperAu,
    ),
  };
}

function asUndecided(
  star: SampleStar,
  rows: CompanionRow[],
  status: string,
  population: Population,
): RunInputs['undecided'][number] {
  const measured =
    rows.find((row) => row.massMjup !== null && row.semiMajorAxisAu !== null) ?? rows[0];
  const { massMjup, semiMajorAxisAu } = measured;
  return {
    name: `${star.name} ${measured.name}`,
    star: star.name,
    starId: star.starId,
    status,
    insideRanges:
      massMjup === null || semiMajorAxisAu === null
        ? null
        : isInside(population, massMjup, semiMajorAxisAu, star.hostMassMsun ?? undefined),
    probability: rows.find((row) => row.probability !== null)?.probability ?? null,
    massMjup,
    semiMajorAxisAu,
  };
}

/**
 * The companions of a sample: one that two surveys list under the same name is one companion.
 * Values come from the first survey, in the surveys' order, that has mass and semi-major axis; a
 * candidate's probability from the first that gives one.
 */
export async function mergeCompanions(
  stars: SampleStar[],
  population: Population,
  transaction: Transaction,
): Promise<MergedCompanions> {
  const targetIds = stars.flatMap(({ entries }) => entries.map(({ target }) => target.id));
  const rows = await CompanionRow.findAll({ where: { targetId: targetIds }, transaction });
  return mergeRows(stars, population, rows);
}

/** The same of companions that were read already. */
export function mergeRows(
  stars: SampleStar[],
  population: Population,
  rows: readonly CompanionRow[],
): MergedCompanions {
  const rowsOf = new Map<string, CompanionRow[]>();
  for (const row of rows) rowsOf.set(row.targetId, [...(rowsOf.get(row.targetId) ?? []), row]);
  const merged: MergedCompanions = { confirmed: [], undecided: [] };
  for (const star of stars) {
    const groups = new Map<string, CompanionRow[]>();
    for (const { target } of star.entries) {
      for (const row of rowsOf.get(target.id) ?? []) {
        groups.set(row.foldedName, [...(groups.get(row.foldedName) ?? []), row]);
      }
    }
    for (const name of [...groups.keys()].sort()) {
      const group = groups.get(name) as CompanionRow[];
      const status = CERTAINTY.find((verdict) => group.some((row) => row.status === verdict));
      if (status === 'confirmed') merged.confirmed.push(asDetection(star, group));
      else if (status !== 'background') {
        merged.undecided.push(asUndecided(star, group, status ?? group[0].status, population));
      }
    }
  }
  return merged;
}
