import { QueryTypes, type Transaction } from 'sequelize';
import { queueMessage } from '@/lib/mail/outbox';
import { database } from '@/models';

/** Whoever waits less than this is still there. */
const WORTH_A_MESSAGE_S = 60;

interface Ended {
  requestedBy: string;
  collaborationId: string;
  collaboration: string;
  slug: string;
  analysis: number;
  run: number;
  question: string | null;
  studyId: string | null;
}

/** Below the collaboration's address. */
function pathOf({ analysis, question, studyId }: Ended): string {
  if (question === 'forecast') return `/forecasts/${studyId}`;
  const page = `/analyses/A-${analysis}`;
  if (question === null) return page;
  return question === 'calibration' ? `${page}/calibration` : `${page}/studies/${question}`;
}

/**
 * Tells whoever asked for a run or a further question that it has ended, in the transaction that
 * ends it; only where it took over a minute. Whether they still look at its page is not known.
 */
export async function tellOfEnd(
  transaction: Transaction,
  jobId: string,
  outcome: 'finished' | 'failed',
): Promise<void> {
  const [ended] = await database().query<Ended>(
    `select j.requested_by as "requestedBy", c.id as "collaborationId", c.name as collaboration,
       c.slug, a.number as analysis, r.number as run, f.kind as question,
       f.id as "studyId"
     from job j join collaboration c on c.id = j.collaboration_id
       left join study f on f.job_id = j.id
       join run r on r.job_id = j.id or r.id = f.run_id
       join analysis a on a.id = r.analysis_id
     where j.id = $1 and j.kind in ('compute-run', 'compute-study')
       and j.requested_by is not null
       and j.created_at < clock_timestamp() - make_interval(secs => $2)`,
    { bind: [jobId, WORTH_A_MESSAGE_S], type: QueryTypes.SELECT, transaction },
  );
  if (!ended) return;
  const { requestedBy: personId, collaborationId, collaboration, slug, question } = ended;
  const key = `A-${ended.analysis}`;
  const name = `run ${ended.run} of ${key}`;
  const item = question === null ? `Run ${ended.run} of ${key}` : `A further question of ${name}`;
  const path = `/${slug}${pathOf(ended)}`;
  const data = { collaboration, item, outcome, path };
  await queueMessage(transaction, 'run', { personId }, data, { collaborationId });
}
