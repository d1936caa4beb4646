import type { Actor } from '@/lib/access/actor';
import { isInside, needsHostMass } from '@/lib/population';
import type { CompanionRow, TargetRow } from '@/models';
import { CollaborationRow } from '@/models';
import { listAnalyses } from '../analyses';
import { leadOf } from '../lead-analysis';

/** The ranges that candidates are held against: those of the lead analysis. */
export interface LeadRanges {
  key: string | null;
  /** Null where mass, axis, host mass or the analysis is missing. */
  covers(row: CompanionRow, target: TargetRow): boolean | null;
}

interface Box {
  massMinMjup: number;
  massMaxMjup: number;
  semiMajorAxisMinAu: number;
  semiMajorAxisMaxAu: number;
}

const isInBox = (box: Box, massMjup: number, semiMajorAxisAu: number) =>
  massMjup >= box.massMinMjup &&
  massMjup <= box.massMaxMjup &&
  semiMajorAxisAu >= box.semiMajorAxisMinAu &&
  semiMajorAxisAu <= box.semiMajorAxisMaxAu;

export async function leadRanges(actor: Actor): Promise<LeadRanges> {
  const [{ settings }, { analyses }] = await Promise.all([
    CollaborationRow.findByPk(actor.collaborationId, { rejectOnEmpty: true }),
    listAnalyses(actor),
  ]);
  const lead = leadOf(analyses, settings);
  if (!lead) return { key: null, covers: () => null };
  const population = lead.population.definition;
  return {
    key: lead.key,
    covers: ({ massMjup, semiMajorAxisAu }, { hostMassMsun }) => {
      if (massMjup === null || semiMajorAxisAu === null) return null;
      // Of a list of systems the analysis keeps the box alone.
      if (population.form === 'systems') return isInBox(population, massMjup, semiMajorAxisAu);
      if (needsHostMass(population) && hostMassMsun === null) return null;
      return isInside(population, massMjup, semiMajorAxisAu, hostMassMsun ?? undefined);
    },
  };
}
