import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { InputError } from '@/lib/errors';
import { type ActivityPage, type ActivityQuery, activityPageSchema } from '@/lib/schemas/activity';
import type { Role } from '@/lib/schemas/common';
import { database } from '@/models';
import { kindOf, newsFor } from './activity-kinds';
import { nameItems } from './item-names';
import { together } from './together';

const EXCERPT_LENGTH = 160;
/** Whom a new release asks for a signature. */
const SIGNERS: readonly Role[] = ['owner', 'author', 'statistician'];

interface Fields {
  id: string;
  at: Date;
  stamp: string;
  personId: string | null;
  name: string | null;
  action: string;
  itemKind: string;
  itemId: string;
  what: string;
  body: string | null;
}

/** Entries of the log, and runs as they ended: what nobody did still happened. */
const EVENTS = `
  select 'log-' || lpad(a.id::text, 20, '0') as id, a.created_at as at, a.person_id, a.action,
    a.item_kind, a.item_id, a.summary as what, (a.details->>'noteId')::uuid as note_id,
    a.details->>'isProposal' = 'true' as is_proposal
  from audit_entry a
  where a.collaboration_id = $1 and a.action = any($2::text[]) and a.summary <> ''
  union all
  select 'run-' || r.id, j.finished_at, null, 'finish-run', 'run', r.id::text,
    'Run ' || r.number || ' of A-' || n.number
      || case j.status when 'done' then ' has finished' else ' failed' end, null, false
  from run r join job j on j.id = r.job_id join analysis n on n.id = r.analysis_id
  where r.collaboration_id = $1 and 'finish-run' = any($2::text[])
    and j.status in ('done', 'failed') and j.finished_at is not null`;

/**
 * What concerns the person: notes that name them, hang on what they made or lead, or answer in a
 * thread where they wrote; proposals for surveys that they lead; requests that they may grant.
 */
const FOR_ME = `(e.person_id is distinct from $3::uuid and (
  exists (select 1 from note_mention m where m.note_id = e.note_id and m.person_id = $3::uuid)
  or exists (select 1 from note n
    left join survey s on s.id = n.survey_id left join analysis a on a.id = n.analysis_id
    left join run r on r.id = n.run_id left join companion c on c.id = n.companion_id
    left join target t on t.id = c.target_id left join survey cs on cs.id = t.survey_id
    where n.id = e.note_id and ($3::uuid in (s.lead_id, a.created_by, r.created_by, cs.lead_id)
      or exists (select 1 from note o where o.created_by = $3::uuid
        and (o.id = n.parent_id or o.parent_id = n.parent_id))))
  or (e.is_proposal and exists (select 1 from companion c join target t on t.id = c.target_id
    join survey s on s.id = t.survey_id where c.id::text = e.item_id and s.lead_id = $3::uuid))
  or (e.action = 'save-release' and $4::boolean))
  or (e.action = 'finish-run' and exists (
    select 1 from run r where r.id::text = e.item_id and r.created_by = $3::uuid)))`;

function readCursor(cursor: string | undefined): [string, string] | null {
  if (cursor === undefined) return null;
  const parts = Buffer.from(cursor, 'base64url').toString('utf8').split('|');
  const [stamp, id] = parts;
  if (parts.length === 2 && /^\d{4}-\d\d-\d\dT[\d:.]+Z$/.test(stamp)) return [stamp, id];
  throw new InputError(
    {
      code: 'cursor-unknown',
      item: 'query "cursor"',
      message: 'this is no cursor of an earlier answer',
    },
    { status: 400 },
  );
}

const writeCursor = ({ stamp, id }: Fields) =>
  Buffer.from(`${stamp}|${id}`, 'utf8').toString('base64url');

function excerptOf(body: string | null): string | null {
  if (body === null || body === '') return null;
  const line = body.replace(/\s+/g, ' ');
  const letters = [...line];
  return letters.length <= EXCERPT_LENGTH ? line : `${letters.slice(0, EXCERPT_LENGTH).join('')}…`;
}

/** What happened, newest first, as far as the actor may read of it. */
export async function listActivity(actor: Actor, query: ActivityQuery): Promise<ActivityPage> {
  demand(actor, 'read');
  const after = readCursor(query.cursor);
  const bind = [
    actor.collaborationId,
    newsFor(actor, query.kind),
    actor.personId,
    actor.roles.some((role) => SIGNERS.includes(role)),
    query.for === 'me',
    query.person ?? null,
    query.item ?? null,
    after?.[0] ?? null,
    after?.[1] ?? null,
    query.limit + 1,
  ];
  return together(`activity ${JSON.stringify(bind)}`, () =>
    readActivity(actor.collaborationId, bind, query.limit),
  );
}

async function readActivity(
  collaborationId: string,
  bind: unknown[],
  limit: number,
): Promise<ActivityPage> {
  const rows = await database().query<Fields>(
    `select e.id, e.at, to_char(e.at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as stamp,
       e.person_id as "personId", p.name, e.action, e.item_kind as "itemKind",
       e.item_id as "itemId", e.what, n.body
     from (${EVENTS}) e left join person p on p.id = e.person_id
       left join note n on n.id = e.note_id and n.collaboration_id = $1
     where ($5::boolean is false or ${FOR_ME})
       and ($6::uuid is null or e.person_id = $6::uuid) and ($7::text is null or e.item_id = $7)
       and ($8::timestamptz is null or (e.at, e.id) < ($8::timestamptz, $9::text))
     order by e.at desc, e.id desc limit $10`,
    { bind, type: QueryTypes.SELECT },
  );
  const shown = rows.slice(0, limit);
  const names = await nameItems(
    collaborationId,
    shown.map(({ itemKind: kind, itemId: id }) => ({ kind, id })),
  );
  return activityPageSchema.parse({
    entries: shown.map((row) => {
      const item = names.get(`${row.itemKind}:${row.itemId}`);
      return {
        id: row.id,
        at: row.at.toISOString(),
        person: personOf(row),
        kind: kindOf(row.action),
        what: row.what,
        item: item ? { id: row.itemId, ...item } : null,
        excerpt: row.action === 'write-note' ? excerptOf(row.body) : null,
      };
    }),
    next: rows.length > limit ? writeCursor(shown[shown.length - 1]) : null,
  });
}

/** Nobody where the words alone are the sentence: a run that ended. */
function personOf({ personId, name, action }: Fields) {
  if (action === 'finish-run') return null;
  return { id: personId, name: name ?? 'somebody who left' };
}
