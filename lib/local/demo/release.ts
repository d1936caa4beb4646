import type { Actor } from '@/lib/access/actor';
import { getRelease } from '@/lib/services/releases/describe';
import { createRelease } from '@/lib/services/releases/draft';
import { freezeRun } from '@/lib/services/releases/freeze';
import { agreeToRelease, publishRelease, signOffRelease } from '@/lib/services/releases/sign';
import { RunRow } from '@/models';

interface DemoRelease {
  actors: { author: Actor; statistician: Actor; owner: Actor };
  analysisId: string;
  finish(jobId: string): Promise<void>;
}

/**
 * Publishes the lead analysis the way that everybody does: frozen, signed twice, run again. A second
 * edition of it is begun, which waits for its signatures.
 */
export async function releaseLead({ actors, analysisId, finish }: DemoRelease): Promise<void> {
  const { author, statistician, owner } = actors;
  const run = await RunRow.findOne({
    where: { analysisId },
    order: [['number', 'DESC']],
    rejectOnEmpty: true,
  });
  await freezeRun(author, run.id, {
    reason: 'The epochs of the candidate inside the ranges cannot tell yet; it is set aside.',
  });
  const title = 'Giant planets on wide orbits around young stars';
  const common = {
    authors: [owner, statistician, author].map(({ personName: name }) => ({
      name,
      affiliation: 'Breakwater collaboration',
    })),
    licence: 'CC-BY-4.0' as const,
    note: 'Invented data: not for use in science.',
    runIds: [run.id],
  };
  const made =
    'Four invented surveys of young stars are taken together, each star once. Everything here is made up for the demonstration; the numbers come from the engine.';
  const { id } = await createRelease(author, {
    ...common,
    title,
    abstract: made,
    replacesId: null,
  });
  await signOffRelease(statistician, id);
  const { job } = await agreeToRelease(owner, id);
  if (!job) throw new Error('the release is not being checked');
  await finish(job.id);
  const { state } = await getRelease(owner, id);
  if (state !== 'checked') throw new Error(`the demonstration's release is ${state}`);
  await publishRelease(owner, id);
  await createRelease(author, {
    ...common,
    title: `${title}: second edition`,
    abstract: `${made} This edition is to say more of the candidates that were set aside.`,
    replacesId: id,
  });
}
