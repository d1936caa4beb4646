import { ThreadFault } from '../pool';
import { readMaps } from './stored-maps';
import type { StudyWork } from './study-context';
import type { VariedMaps } from './study-variation';

export interface AnswerUnder {
  limit: number | null;
  exposure: number | null;
  /** Why there is no limit. */
  fault: string | null;
  starsUnchanged: number;
}

/** The run's question asked again on changed maps. */
export async function answerUnder(
  given: StudyWork,
  { digests, starsUnchanged, fault }: VariedMaps,
): Promise<AnswerUnder> {
  const none = { limit: null, exposure: null, starsUnchanged };
  if (fault !== null) return { ...none, fault };
  const maps = await readMaps(given.collaborationId, digests, given.grid);
  try {
    const { limit, exposure } = await given.compute('limit', { ...given.question, maps });
    return { limit, exposure, fault: null, starsUnchanged };
  } catch (error) {
    if (!(error instanceof ThreadFault)) throw error;
    return { ...none, fault: error.message };
  }
}
