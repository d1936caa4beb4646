import { QueryTypes, type Transaction, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import type { CombinationRule } from '@/lib/schemas/combinations';
import { type ChangeSettings, type SettingsView, settingsSchema } from '@/lib/schemas/settings';
import { CollaborationRow, database, inTransaction } from '@/models';
import { findAnalysis } from './analysis-lookup';
import { recordAudit } from './audit';
import { isReserved, NOT_FREE } from './collaborations';

/** What stands in the row; what is absent has its usual value. */
interface Stored {
  combination?: CombinationRule;
  credibleLevel?: number;
  timeZone?: string;
  leadAnalysisId?: string;
  needsTwoPeople?: boolean;
}

const USUAL = { combination: 'default', credibleLevel: 0.95, timeZone: 'UTC' } as const;

async function findRow(id: string, transaction?: Transaction): Promise<CollaborationRow> {
  database();
  const row = await CollaborationRow.findByPk(id, { transaction });
  if (!row) throw new NotFound('collaboration');
  return row;
}

/** People who could freeze and agree: two of them make the two-person rule possible. */
async function countSigners(collaborationId: string, transaction?: Transaction): Promise<number> {
  const [{ count }] = await database().query<{ count: number }>(
    `select count(*)::int as count from member
     where collaboration_id = $1 and suspended_at is null and roles && array['author', 'owner']`,
    { bind: [collaborationId], type: QueryTypes.SELECT, transaction },
  );
  return count;
}

/**
 * Whether a release needs the agreement of somebody else than who froze its run: as an owner
 * decided; until then, as soon as the collaboration has two authors or owners.
 */
export async function needsTwoPeople(
  collaborationId: string,
  transaction?: Transaction,
): Promise<boolean> {
  const { settings } = await findRow(collaborationId, transaction);
  const chosen = (settings as Stored).needsTwoPeople;
  return chosen ?? (await countSigners(collaborationId, transaction)) >= 2;
}

/** What new analyses and combinations begin with. */
export async function newRecipeDefaults(
  collaborationId: string,
  transaction?: Transaction,
): Promise<{ combination: CombinationRule; credibleLevel: number }> {
  const { combination, credibleLevel } = (await findRow(collaborationId, transaction))
    .settings as Stored;
  return {
    combination: combination ?? USUAL.combination,
    credibleLevel: credibleLevel ?? USUAL.credibleLevel,
  };
}

async function leadKeyOf(
  { leadAnalysisId }: Stored,
  transaction?: Transaction,
): Promise<string | null> {
  const [found] = await database().query<{ key: string }>(
    `select 'A-' || number as key from analysis where id = $1::uuid`,
    { bind: [leadAnalysisId ?? null], type: QueryTypes.SELECT, transaction },
  );
  return found?.key ?? null;
}

async function toView(
  actor: Actor,
  row: CollaborationRow,
  transaction?: Transaction,
): Promise<SettingsView> {
  const stored = row.settings as Stored;
  return settingsSchema.parse({
    ...USUAL,
    ...stored,
    name: row.name,
    slug: row.slug,
    leadAnalysis: await leadKeyOf(stored, transaction),
    needsTwoPeople:
      stored.needsTwoPeople ?? (await countSigners(actor.collaborationId, transaction)) >= 2,
    needsTwoPeopleChosen: stored.needsTwoPeople ?? null,
    archivedAt: row.archivedAt?.toISOString() ?? null,
    can: { manage: may(actor, 'manage-collaboration') },
  });
}

export async function getSettings(actor: Actor): Promise<SettingsView> {
  demand(actor, 'read');
  return toView(actor, await findRow(actor.collaborationId));
}

/** The time zone of the dates on pages. */
export async function timeZoneOf(actor: Actor): Promise<string> {
  const [row] = await database().query<{ timeZone: string | null }>(
    `select settings->>'timeZone' as "timeZone" from collaboration where id = $1`,
    { bind: [actor.collaborationId], type: QueryTypes.SELECT },
  );
  return row?.timeZone ?? USUAL.timeZone;
}

const words: Record<keyof ChangeSettings, string> = {
  name: 'the name',
  slug: 'the address',
  combination: 'the rule for a star in several surveys',
  credibleLevel: 'the default credible level',
  timeZone: 'the time zone',
  leadAnalysis: 'the lead analysis',
  needsTwoPeople: 'the two-person rule',
  isArchived: 'whether it is archived',
};

function summaryOf(changed: (keyof ChangeSettings)[], isArchived: boolean): string {
  const rest = changed.filter((key) => key !== 'isArchived').map((key) => words[key]);
  const parts = rest.length > 0 ? [`changed ${rest.join(', ')}`] : [];
  if (changed.includes('isArchived')) {
    parts.push(isArchived ? 'archived the collaboration' : 'opened the collaboration again');
  }
  return parts.join(' and ');
}

/** The settings as the input names them, for the log's before and after. */
function valuesOf(view: SettingsView): Required<ChangeSettings> {
  const { name, slug, combination, credibleLevel, timeZone, leadAnalysis } = view;
  return {
    ...{ name, slug, combination, credibleLevel, timeZone, leadAnalysis },
    needsTwoPeople: view.needsTwoPeopleChosen,
    isArchived: view.archivedAt !== null,
  };
}

async function applyChange(
  actor: Actor,
  row: CollaborationRow,
  input: ChangeSettings,
  transaction: Transaction,
): Promise<void> {
  const { name, slug, isArchived, leadAnalysis, needsTwoPeople: two } = input;
  const { combination, credibleLevel, timeZone } = input;
  const stored: Stored = { ...(row.settings as Stored) };
  if (combination !== undefined) stored.combination = combination;
  if (credibleLevel !== undefined) stored.credibleLevel = credibleLevel;
  if (timeZone !== undefined) stored.timeZone = timeZone;
  if (leadAnalysis === null) delete stored.leadAnalysisId;
  else if (leadAnalysis) stored.leadAnalysisId = (await findAnalysis(actor, leadAnalysis)).id;
  if (two === null) delete stored.needsTwoPeople;
  else if (two !== undefined) stored.needsTwoPeople = two;
  const archivedAt =
    isArchived === undefined ? row.archivedAt : isArchived ? (row.archivedAt ?? new Date()) : null;
  if (slug !== undefined && slug !== row.slug && isReserved(slug)) {
    throw new Conflict(NOT_FREE, 'address-taken');
  }
  await row.update(
    { name: name ?? row.name, slug: slug ?? row.slug, settings: { ...stored }, archivedAt },
    { transaction },
  );
}

/** Changes what is given and leaves the rest; the log holds each value before and after. */
export async function changeSettings(actor: Actor, input: ChangeSettings): Promise<SettingsView> {
  demand(actor, 'manage-collaboration');
  try {
    return await inTransaction(async (transaction) => {
      const row = await CollaborationRow.findByPk(actor.collaborationId, {
        lock: transaction.LOCK.UPDATE,
        transaction,
      });
      if (!row) throw new NotFound('collaboration');
      const before = valuesOf(await toView(actor, row, transaction));
      await applyChange(actor, row, input, transaction);
      const view = await toView(actor, row, transaction);
      const after = valuesOf(view);
      const keys = Object.keys(before) as (keyof ChangeSettings)[];
      const changed = keys.filter((key) => before[key] !== after[key]);
      if (changed.length === 0) return view;
      const pick = (values: Required<ChangeSettings>) =>
        Object.fromEntries(changed.map((key) => [key, values[key]]));
      const item = { kind: 'collaboration', id: row.id };
      const summary = summaryOf(changed, after.isArchived === true);
      const details = { before: pick(before), after: pick(after) };
      await recordAudit(actor, 'change-settings', item, summary, transaction, details);
      return view;
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new Conflict(NOT_FREE, 'address-taken');
    throw error;
  }
}
