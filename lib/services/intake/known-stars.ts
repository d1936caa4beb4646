import type { Transaction } from 'sequelize';
import { foldName, type TargetRecord } from '@/lib/formats';
import type { MatchEvidence } from '@/lib/schemas/stars';
import { StarMatchRow, StarRow, TargetRow } from '@/models';

export interface FoundStar {
  star: StarRow;
  evidence: MatchEvidence;
  /** The star by whose name or number it was found, where that one was joined to `star`. */
  through: StarRow | null;
}

/**
 * Stars of the collaboration, found by Gaia number first, by any of their names second, and third
 * by a name that a survey lists for one star only.
 */
export class KnownStars {
  private readonly byId = new Map<string, StarRow>();
  private readonly byGaia = new Map<string, StarRow>();
  private readonly byName = new Map<string, StarRow>();
  /** null where surveys list the name for two stars. */
  private readonly byAlias = new Map<string, StarRow | null>();

  constructor(
    stars: StarRow[],
    targets: Pick<TargetRow, 'starId' | 'name' | 'otherNames' | 'gaiaDr3Id'>[] = [],
  ) {
    for (const star of stars) {
      this.byId.set(star.id, star);
      if (star.gaiaDr3Id) this.byGaia.set(star.gaiaDr3Id, star);
      this.byName.set(star.foldedName, star);
    }
    for (const { starId, name, otherNames } of targets) {
      const star = this.byId.get(starId);
      if (!star) continue;
      for (const alias of [name, ...otherNames].map(foldName)) {
        const known = this.byAlias.get(alias);
        this.byAlias.set(alias, known === undefined || known === star ? star : null);
      }
    }
  }

  static async load(collaborationId: string): Promise<KnownStars> {
    const [stars, targets] = await Promise.all([
      StarRow.findAll({ where: { collaborationId } }),
      TargetRow.findAll({
        attributes: ['starId', 'name', 'otherNames', 'gaiaDr3Id'],
        where: { collaborationId },
      }),
    ]);
    return new KnownStars(stars, targets);
  }

  /** The star to which this one was joined, itself if to none. */
  rootOf(star: StarRow): StarRow {
    let root = star;
    while (root.mergedInto !== null) {
      const next = this.byId.get(root.mergedInto);
      if (!next) throw new Error(`star ${root.id} was joined to one that is not there`);
      root = next;
    }
    return root;
  }

  ofId(id: string): StarRow | undefined {
    const star = this.byId.get(id);
    return star && this.rootOf(star);
  }

  ofGaia(gaiaDr3Id: string): StarRow | undefined {
    const star = this.byGaia.get(gaiaDr3Id);
    return star && this.rootOf(star);
  }

  find({
    gaiaDr3Id,
    name,
    otherNames,
  }: Pick<TargetRecord, 'gaiaDr3Id' | 'name' | 'otherNames'>): FoundStar | undefined {
    const answer = (star: StarRow, evidence: MatchEvidence): FoundStar => {
      const root = this.rootOf(star);
      return { star: root, evidence, through: root === star ? null : star };
    };
    const byNumber = gaiaDr3Id ? this.byGaia.get(gaiaDr3Id) : undefined;
    if (byNumber) return answer(byNumber, { by: 'identifier', found: `Gaia DR3 ${gaiaDr3Id}` });
    for (const names of [this.byName, this.byAlias]) {
      for (const found of [name, ...otherNames]) {
        const star = names.get(foldName(found));
        if (star) return answer(star, { by: 'name', found });
      }
    }
    return undefined;
  }
}

/** A target found by the name of a joined star parts with it, should the two be parted again. */
export async function noteJoined(
  targetId: string,
  through: StarRow,
  transaction: Transaction,
): Promise<void> {
  const match = await StarMatchRow.findOne({
    where: { absorbedStarId: through.id, state: 'confirmed' },
    transaction,
  });
  await match?.update({ movedTargetIds: [...match.movedTargetIds, targetId] }, { transaction });
}
