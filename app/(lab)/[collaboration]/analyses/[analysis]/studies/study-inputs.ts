import { notFound } from 'next/navigation';
import { newestRunOf } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { studyQuerySchema } from '@/lib/schemas/studies';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { getAnalysis } from '@/lib/services/analyses';
import { getStudy, listStudies } from '@/lib/services/studies';

/** The questions of a kind, and the answer that is shown first: the one asked for, or the newest. */
async function firstAnswer(actor: Actor, analysisKey: string, kind: StudyKind, asked?: string) {
  const { studies } = await listStudies(actor, studyQuerySchema.parse({ kind }));
  const newest = studies.find(
    ({ job, run }) => job.status === 'done' && run.analysisKey === analysisKey,
  );
  const id = asked ?? newest?.id;
  if (id === undefined) return { studies };
  const study = await getStudy(actor, id).catch((reason) => {
    // The page itself says that there is no such answer.
    if (reason instanceof NotFound) return undefined;
    throw reason;
  });
  return { studies, study };
}

/** An analysis with its newest finished run, which further questions are asked of. */
export async function studyInputs(collaboration: string, analysisKey: string) {
  const actor = await currentActor(collaboration);
  try {
    const analysis = await getAnalysis(actor, analysisKey);
    return {
      collaboration: actor.collaboration,
      analysis,
      ...(await newestRunOf(actor, analysis)),
    };
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}

/** The same with what was asked of one kind, and the answer that is shown first. */
export async function answeredInputs(
  collaboration: string,
  analysisKey: string,
  kind: StudyKind,
  asked?: string,
) {
  const actor = await currentActor(collaboration);
  const [inputs, first] = await Promise.all([
    studyInputs(collaboration, analysisKey),
    firstAnswer(actor, analysisKey, kind, asked),
  ]);
  return { ...inputs, first };
}
