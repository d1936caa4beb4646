import { Op } from 'sequelize';
import { NotFound } from '@/lib/errors';
import { citeAsBibtex, citeAsText } from '@/lib/formats/bundle';
import { listedDefinitionSchema } from '@/lib/schemas/populations';
import type { ReleasePage, ShownRun } from '@/lib/schemas/release-page';
import type { Licence } from '@/lib/schemas/releases';
import { runResultSchema } from '@/lib/schemas/runs';
import {
  AnalysisRow,
  CollaborationRow,
  database,
  FrozenRunRow,
  PopulationRow,
  ReleaseFileRow,
  ReleaseRow,
  ReleaseRunRow,
  RunRow,
  StudyRow,
} from '@/models';
import { findDeposit } from '../deposits/deposits';
import { type FinishedRun, type ReleaseFacts, statedRange } from '../export-limits';
import { writeMethods } from '../exports/methods';
import { findTombstone } from '../leaving/tombstones';
import { nameOfStudy } from '../study-words';
import { addressOfRelease } from './address';
import { factsOfRelease } from './facts';

async function showRun(runId: string, release?: ReleaseFacts): Promise<ShownRun> {
  const run = await RunRow.findByPk(runId, { rejectOnEmpty: true });
  const [frozen, analysis, population, studies] = await Promise.all([
    FrozenRunRow.findOne({
      attributes: { exclude: ['snapshot'] },
      where: { runId },
      rejectOnEmpty: true,
    }),
    AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true }),
    PopulationRow.findByPk(run.recipe.populationId, { rejectOnEmpty: true }),
    StudyRow.findAll({
      attributes: ['kind', 'headline', 'number', 'settings'],
      where: { runId, headline: { [Op.not]: null } },
      order: [['number', 'DESC']],
    }),
  ]);
  const { inputs, inputsDigest, resultDigest } = run;
  if (!inputs || !inputsDigest || !resultDigest) throw new NotFound('result');
  const result = runResultSchema.parse(run.result);
  const finished: FinishedRun = {
    id: run.id,
    collaborationId: run.collaborationId,
    analysis: `A-${analysis.number}`,
    analysisName: analysis.name,
    number: run.number,
    seed: run.seed,
    finishedAt: run.finishedAt?.toISOString() ?? null,
    inputsDigest,
    hasOlderInputs: false,
    recipe: run.recipe,
    population: population.definition,
    inputs,
    result,
    resultDigest,
    engineVersion: run.engineVersion,
    ...(release && { release }),
  };
  const newest = new Map(studies.reverse().map((study) => [study.kind, study]));
  const { surveys, companions, cooling } = inputs;
  const { starTable: _stars, depth: _depth, ...slim } = result;
  return {
    id: run.id,
    name: `A-${analysis.number}, run ${run.number}`,
    result: slim,
    population: listedDefinitionSchema.parse(population.definition),
    surveys: surveys.map((survey) => survey.name),
    companions,
    cooling,
    range: statedRange(population.definition),
    prior: run.recipe.prior,
    frozenBy: frozen.frozenByName,
    frozenAt: frozen.frozenAt.toISOString(),
    reason: frozen.reason,
    inputsDigest,
    resultDigest,
    snapshotSha256: frozen.snapshotSha256,
    methods: { text: writeMethods(finished, 'txt'), latex: writeMethods(finished, 'tex') },
    alternatives: [...newest.values()].map(({ kind, settings, headline }) => ({
      kind,
      name: nameOfStudy(settings),
      headline: headline ?? '',
    })),
  };
}

const signed = (by: string | null, at: Date | null) =>
  by !== null && at !== null ? { by, at: at.toISOString() } : null;

async function neighbours(row: ReleaseRow) {
  const ref = (other: ReleaseRow | null) =>
    other ? { key: `R-${other.number}`, code: other.code } : null;
  const [before, after] = await Promise.all([
    row.replacesId
      ? ReleaseRow.findOne({ where: { id: row.replacesId, publishedAt: { [Op.not]: null } } })
      : null,
    ReleaseRow.findOne({ where: { replacesId: row.id, publishedAt: { [Op.not]: null } } }),
  ]);
  return { replaces: ref(before), replacedBy: ref(after) };
}

/** The page of a release: published, or a draft for whoever holds a link to it. */
export async function showRelease(row: ReleaseRow): Promise<ReleasePage> {
  const links = await ReleaseRunRow.findAll({
    where: { releaseId: row.id },
    order: [['position', 'ASC']],
  });
  const runs: ShownRun[] = [];
  if (!row.withdrawnAt) {
    for (const { runId } of links) runs.push(await showRun(runId, factsOfRelease(row)));
  }
  const files = row.withdrawnAt
    ? []
    : await ReleaseFileRow.findAll({
        attributes: { exclude: ['bytes'] },
        where: { releaseId: row.id },
        order: [['position', 'ASC']],
      });
  const { name } = await CollaborationRow.findByPk(row.collaborationId, { rejectOnEmpty: true });
  const key = `R-${row.number}`;
  const address = addressOfRelease(row.code);
  const deposit = await findDeposit(row.id);
  const cited =
    row.publishedAt && runs.length > 0
      ? {
          key: `rarebound-${row.code}`,
          title: row.title,
          authors: row.authors,
          year: row.publishedAt.getUTCFullYear(),
          version: `release ${key}`,
          fingerprint: runs[0].resultDigest,
          address,
          ...(deposit && !deposit.isPractice && { doi: deposit.doi }),
        }
      : null;
  return {
    kind: 'release',
    key,
    title: row.title,
    collaboration: name,
    authors: row.authors,
    abstract: row.abstract,
    note: row.note,
    licence: row.licence as Licence,
    address: row.publishedAt ? address : null,
    publishedAt: row.publishedAt?.toISOString() ?? null,
    signedOff: signed(row.signedOffByName, row.signedOffAt),
    agreed: signed(row.agreedByName, row.agreedAt),
    published: signed(row.publishedByName, row.publishedAt),
    verification: row.verification,
    withdrawn: row.withdrawnAt
      ? { at: row.withdrawnAt.toISOString(), reason: row.withdrawnReason ?? '' }
      : null,
    ...(await neighbours(row)),
    files: files.map(({ name: file, description, mediaType, byteLength, sha256 }) => ({
      name: file,
      description,
      mediaType,
      byteLength,
      sha256,
    })),
    deposit,
    citation: cited && { text: citeAsText(cited), bibtex: citeAsBibtex(cited) },
    runs,
  };
}

/** A frozen run as a guest reads it: no release yet. */
export async function showFrozenRun(collaborationId: string, runId: string): Promise<ReleasePage> {
  const run = await showRun(runId);
  const { name } = await CollaborationRow.findByPk(collaborationId, { rejectOnEmpty: true });
  return {
    kind: 'run',
    key: run.name,
    title: `${run.name}, frozen`,
    collaboration: name,
    authors: [],
    abstract: '',
    note: '',
    licence: null,
    address: null,
    publishedAt: null,
    signedOff: null,
    agreed: null,
    published: null,
    verification: null,
    withdrawn: null,
    replaces: null,
    replacedBy: null,
    files: [],
    citation: null,
    runs: [run],
  };
}

/** The public page at an address. @throws NotFound before it is published */
export async function findPublicRelease(code: string): Promise<ReleasePage> {
  database();
  const row = /^[a-z0-9]{10}$/.test(code) ? await ReleaseRow.findOne({ where: { code } }) : null;
  if (!row) {
    const tombstone = await findTombstone(code);
    if (tombstone) return tombstone;
  }
  if (!row?.publishedAt) throw new NotFound('release');
  return showRelease(row);
}
