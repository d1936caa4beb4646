import { Op, QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import {
  type Licence,
  type ReleaseRunView,
  type ReleaseState,
  type ReleaseView,
  releaseRunSchema,
} from '@/lib/schemas/releases';
import {
  database,
  FrozenRunRow,
  JobRow,
  PersonRow,
  ReleaseFileRow,
  ReleaseRow,
  ReleaseRunRow,
} from '@/models';
import { needsTwoPeople } from '../settings';
import { together } from '../together';
import { GROUND, type Ground, JOIN_GROUND, restsOn } from './rests-on';

const RUNS = `
  select q.release_id as "releaseId", r.id, r.number, 'A-' || a.number as "analysisKey",
    a.name as "analysisName", x.statement->>'sentence' as sentence,
    (x.answer->>'limit')::float8 as "limit",
    (r.recipe->>'credibleLevel')::float8 as "credibleLevel", ${GROUND},
    f.frozen_by_name as "frozenBy", f.frozen_at as "frozenAt",
    r.inputs_digest as "inputsDigest", r.result_digest as "resultDigest"
  from release_run q join run r on r.id = q.run_id join analysis a on a.id = r.analysis_id
    join frozen_run f on f.run_id = r.id ${JOIN_GROUND}
  where q.release_id = any($1::uuid[]) order by q.position`;

/** The runs of releases, in their order. */
export async function runsOfReleases(ids: string[]): Promise<Map<string, ReleaseRunView[]>> {
  const rows = await database().query<Ground & { releaseId: string; frozenAt: Date }>(RUNS, {
    bind: [ids],
    type: QueryTypes.SELECT,
  });
  const runs = new Map<string, ReleaseRunView[]>(ids.map((id) => [id, []]));
  for (const { releaseId, frozenAt, ...row } of rows) {
    runs
      .get(releaseId)
      ?.push(releaseRunSchema.parse({ ...row, ...restsOn(row), frozenAt: frozenAt.toISOString() }));
  }
  return runs;
}

export function stateOfRelease(row: ReleaseRow, job: JobRow | undefined): ReleaseState {
  if (row.withdrawnAt) return 'withdrawn';
  if (row.publishedAt) return 'published';
  if (!row.jobId) return 'draft';
  if (job?.status === 'failed' || job?.status === 'cancelled') return 'failed';
  if (!row.verification) return 'checking';
  return row.verification.isSame ? 'checked' : 'mismatch';
}

const signed = (by: string | null, at: Date | null) =>
  by !== null && at !== null ? { by, at: at.toISOString() } : null;

const refOf = (row: ReleaseRow | undefined) =>
  row ? { id: row.id, key: `R-${row.number}`, code: row.code } : null;

/** Who froze the runs of a release. */
async function freezersOf(ids: string[]): Promise<Map<string, Set<string | null>>> {
  const links = await ReleaseRunRow.findAll({ where: { releaseId: ids } });
  const frozen = await FrozenRunRow.findAll({
    attributes: ['runId', 'frozenBy'],
    where: { runId: links.map(({ runId }) => runId) },
  });
  const byRun = new Map(frozen.map(({ runId, frozenBy }) => [runId, frozenBy]));
  const found = new Map<string, Set<string | null>>();
  for (const { releaseId, runId } of links) {
    found.set(releaseId, (found.get(releaseId) ?? new Set()).add(byRun.get(runId) ?? null));
  }
  return found;
}

export const OWN_FREEZE =
  'You froze a run of this release: another author or an owner must agree to it';

/** What hangs on releases, read for all of them at once, whoever asks. */
async function readBehind(collaborationId: string, rows: ReleaseRow[]) {
  const ids = rows.map(({ id }) => id);
  const [runs, jobs, others, makers, files, freezers, isTwo] = await Promise.all([
    runsOfReleases(ids),
    JobRow.findAll({ where: { id: rows.flatMap(({ jobId }) => jobId ?? []) } }),
    ReleaseRow.findAll({
      where: {
        collaborationId,
        [Op.or]: [
          { id: rows.flatMap(({ replacesId }) => replacesId ?? []) },
          { replacesId: ids, publishedAt: { [Op.not]: null } },
        ],
      },
    }),
    PersonRow.findAll({ where: { id: rows.flatMap(({ createdBy }) => createdBy ?? []) } }),
    ReleaseFileRow.findAll({
      attributes: { exclude: ['bytes'] },
      where: { releaseId: ids },
      order: [['position', 'ASC']],
    }),
    freezersOf(ids),
    needsTwoPeople(collaborationId),
  ]);
  return { rows, runs, jobs, others, makers, files, freezers, isTwo };
}

export async function describeReleases(actor: Actor, rows: ReleaseRow[]): Promise<ReleaseView[]> {
  return rows.length === 0 ? [] : viewsOf(actor, await readBehind(actor.collaborationId, rows));
}

function viewsOf(actor: Actor, behind: Awaited<ReturnType<typeof readBehind>>): ReleaseView[] {
  const { rows, runs, jobs, others, makers, files, freezers, isTwo } = behind;
  return rows.map((row) => {
    const job = jobs.find(({ id }) => id === row.jobId);
    const state = stateOfRelease(row, job);
    const isOpen = ['draft', 'mismatch', 'failed', 'checked'].includes(state);
    const mayAgree = may(actor, 'agree-release');
    const isOwn = isTwo && freezers.get(row.id)?.has(actor.personId) === true;
    return {
      id: row.id,
      key: `R-${row.number}`,
      code: row.code,
      state,
      title: row.title,
      authors: row.authors,
      abstract: row.abstract,
      licence: row.licence as Licence,
      note: row.note,
      runs: runs.get(row.id) ?? [],
      replaces: refOf(others.find(({ id }) => id === row.replacesId)),
      replacedBy: refOf(others.find(({ replacesId }) => replacesId === row.id)),
      createdBy: makers.find(({ id }) => id === row.createdBy)?.name ?? null,
      createdAt: row.createdAt.toISOString(),
      signedOff: signed(row.signedOffByName, row.signedOffAt),
      agreed: signed(row.agreedByName, row.agreedAt),
      published: signed(row.publishedByName, row.publishedAt),
      withdrawn:
        row.withdrawnAt && row.withdrawnReason !== null
          ? {
              by: row.withdrawnByName ?? 'somebody who left',
              at: row.withdrawnAt.toISOString(),
              reason: row.withdrawnReason,
            }
          : null,
      job: job ? { id: job.id, status: job.status, fault: job.fault } : null,
      verification: row.verification,
      files: files
        .filter(({ releaseId }) => releaseId === row.id)
        .map(({ name, mediaType, description, byteLength, sha256 }) => ({
          name,
          mediaType,
          description,
          byteLength,
          sha256,
        })),
      can: {
        change: isOpen && may(actor, 'freeze-run'),
        signOff: isOpen && !row.signedOffAt && may(actor, 'sign-off-release'),
        agree: isOpen && !row.agreedAt && mayAgree && !isOwn,
        publish: state === 'checked' && mayAgree,
        withdraw: state === 'published' && may(actor, 'withdraw-release'),
        link: may(actor, 'link-guest'),
        whyNotAgree: !mayAgree
          ? 'An author or an owner must agree to it'
          : isOwn
            ? OWN_FREEZE
            : null,
        whyNotSignOff: may(actor, 'sign-off-release') ? null : 'A statistician must sign it off',
      },
    };
  });
}

/** A release of this collaboration by its key or id; the same "no such release" for foreign ones. */
export async function findRelease(actor: Actor, key: string): Promise<ReleaseRow> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const number = /^R-([1-9]\d{0,8})$/.exec(key)?.[1];
  const where = number
    ? { collaborationId, number: Number(number) }
    : idSchema.safeParse(key).success
      ? { collaborationId, id: key }
      : null;
  const row = where && (await ReleaseRow.findOne({ where }));
  if (!row) throw new NotFound('release');
  return row;
}

/** All releases, the newest first. */
export async function listReleases(actor: Actor): Promise<{ releases: ReleaseView[] }> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const behind = await together(`releases ${collaborationId}`, async () => {
    database();
    const rows = await ReleaseRow.findAll({
      where: { collaborationId },
      order: [['number', 'DESC']],
    });
    return readBehind(collaborationId, rows);
  });
  return { releases: viewsOf(actor, behind) };
}

export async function getRelease(actor: Actor, key: string): Promise<ReleaseView> {
  const [view] = await describeReleases(actor, [await findRelease(actor, key)]);
  return view;
}
