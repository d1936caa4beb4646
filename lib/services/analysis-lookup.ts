import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { AnalysisRow } from '@/models';

const KEY = /^A-([1-9][0-9]{0,8})$/;

/** The analysis "A-31" of this collaboration, or the same "no such analysis" for any other. */
export async function findAnalysis(actor: Actor, key: string): Promise<AnalysisRow> {
  demand(actor, 'read');
  const number = KEY.exec(key)?.[1];
  const row =
    number === undefined
      ? null
      : await AnalysisRow.findOne({
          where: { collaborationId: actor.collaborationId, number: Number(number) },
        });
  if (!row) throw new NotFound('analysis');
  return row;
}
