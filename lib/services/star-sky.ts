import type { Transaction } from 'sequelize';
import { foldName } from '@/lib/formats';
import { findPairs, type SkyEntry } from '@/lib/quantities/sky-match';
import type { MatchEvidence } from '@/lib/schemas/stars';
import { StarMatchRow, StarRow, TargetRow } from '@/models';

const J2000 = 2000;
const GAIA_DR3_EPOCH = 2016;

const numberIn = (attributes: Record<string, unknown>, name: string): number | null => {
  const value = attributes[name];
  return typeof value === 'number' ? value : null;
};

/** Where a target stands on the sky; null without a position. The default epoch is the format's. */
export function skyEntryOf(target: TargetRow): SkyEntry | null {
  const { raDeg, decDeg, attributes, gaiaDr3Id, distancePc, parallaxMas } = target;
  if (raDeg === null || decDeg === null) return null;
  return {
    raDeg,
    decDeg,
    epochYr: numberIn(attributes, 'refEpoch') ?? (gaiaDr3Id ? GAIA_DR3_EPOCH : J2000),
    pmRaMasYr: numberIn(attributes, 'pmRaMasYr'),
    pmDecMasYr: numberIn(attributes, 'pmDecMasYr'),
    distancePc: distancePc ?? (parallaxMas === null ? null : 1000 / parallaxMas),
  };
}

/** The root of every star: itself, or the one to which it was joined. */
export function rootsOf(stars: Pick<StarRow, 'id' | 'mergedInto'>[]): Map<string, string> {
  const next = new Map(stars.map(({ id, mergedInto }) => [id, mergedInto]));
  const rootOf = (id: string): string => {
    const up = next.get(id);
    return up ? rootOf(up) : id;
  };
  return new Map(stars.map(({ id }) => [id, rootOf(id)]));
}

const strength = { identifier: 0, name: 1, position: 2 };

/** Whether a is a better reason to take two stars for one. */
function isStronger(a: MatchEvidence, b: MatchEvidence): boolean {
  if (a.by !== b.by) return strength[a.by] < strength[b.by];
  return (a.separationArcsec ?? 0) < (b.separationArcsec ?? 0);
}

export const pairKey = (a: string, b: string) => (a < b ? `${a} ${b}` : `${b} ${a}`);

/** Pairs of stars that share a Gaia number, a name or a place, each with its best reason. */
function findLikely(targets: TargetRow[]): Map<string, MatchEvidence> {
  const likely = new Map<string, MatchEvidence>();
  const note = (a: TargetRow, b: TargetRow, evidence: MatchEvidence) => {
    if (a.starId === b.starId) return;
    // Two Gaia numbers are two sources.
    if (a.gaiaDr3Id && b.gaiaDr3Id && a.gaiaDr3Id !== b.gaiaDr3Id) return;
    const key = pairKey(a.starId, b.starId);
    const known = likely.get(key);
    if (!known || isStronger(evidence, known)) likely.set(key, evidence);
  };
  const shared = new Map<string, TargetRow[]>();
  const share = (key: string, target: TargetRow, evidence: MatchEvidence) => {
    const holders = shared.get(key) ?? [];
    for (const other of holders) note(other, target, evidence);
    shared.set(key, [...holders, target]);
  };
  for (const target of targets) {
    const { gaiaDr3Id, name, otherNames } = target;
    if (gaiaDr3Id) {
      share(`gaia ${gaiaDr3Id}`, target, { by: 'identifier', found: `Gaia DR3 ${gaiaDr3Id}` });
    }
    for (const found of [name, ...otherNames]) {
      share(`name ${foldName(found)}`, target, { by: 'name', found });
    }
  }
  const placed = targets.flatMap((target) => {
    const entry = skyEntryOf(target);
    return entry ? [{ target, entry }] : [];
  });
  for (const { first, second, ...found } of findPairs(placed.map(({ entry }) => entry))) {
    note(placed[first].target, placed[second].target, { by: 'position', ...found });
  }
  return likely;
}

/**
 * Proposes every pair of stars that may be one and that nobody has decided yet.
 *
 * @returns how many pairs are new
 */
export async function proposeMatches(
  collaborationId: string,
  transaction: Transaction,
): Promise<number> {
  const [targets, stars, known] = [
    await TargetRow.findAll({
      attributes: [
        ...['id', 'starId', 'name', 'otherNames', 'gaiaDr3Id', 'raDeg', 'decDeg'],
        ...['distancePc', 'parallaxMas', 'attributes'],
      ],
      where: { collaborationId },
      order: [
        ['foldedName', 'ASC'],
        ['id', 'ASC'],
      ],
      transaction,
    }),
    await StarRow.findAll({
      attributes: ['id', 'mergedInto'],
      where: { collaborationId },
      transaction,
    }),
    await StarMatchRow.findAll({ where: { collaborationId }, transaction }),
  ];
  const roots = rootsOf(stars);
  const rootOf = (id: string) => roots.get(id) ?? id;
  const settled = new Set(
    known.map(({ firstStarId, secondStarId }) =>
      pairKey(rootOf(firstStarId), rootOf(secondStarId)),
    ),
  );
  const rows = [...findLikely(targets)]
    .filter(([key]) => !settled.has(key))
    .map(([key, evidence]) => {
      const [firstStarId, secondStarId] = key.split(' ');
      return { collaborationId, firstStarId, secondStarId, state: 'proposed' as const, evidence };
    });
  await StarMatchRow.bulkCreate(rows, { transaction });
  return rows.length;
}
