import { literal } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import {
  type CandidateList,
  type CandidateQuery,
  companionStatusSchema,
} from '@/lib/schemas/candidates';
import {
  CompanionObservationRow,
  CompanionRow,
  CompanionVerdictRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { type PageAsked, pageOf } from '../behind-row';
import { notWithdrawn } from '../sharing/archived';
import { findSurvey } from '../surveys';
import { together } from '../together';
import { describeCandidate } from './describe';
import { openProposals } from './detail';
import { type LeadRanges, leadRanges } from './lead-ranges';

/** What waits for a person comes first: inside the ranges, then outside, then what is decided. */
function urgency(status: CompanionRow['status'], isInside: boolean | null): number {
  if (status === 'confirmed') return 3;
  if (status === 'background') return 4;
  return isInside === true ? 0 : isInside === null ? 1 : 2;
}

async function countsOf(ids: string[]) {
  const where = { companionId: ids };
  const [observations, verdicts] = await Promise.all([
    CompanionObservationRow.findAll({ attributes: ['companionId'], where }),
    CompanionVerdictRow.findAll({
      attributes: ['companionId', 'isProposal'],
      where,
      order: [['number', 'ASC']],
    }),
  ]);
  return (id: string) => ({
    observations: observations.filter(({ companionId }) => companionId === id).length,
    proposals: openProposals(verdicts.filter(({ companionId }) => companionId === id)),
  });
}

type Loaded = { row: CompanionRow; target: TargetRow; survey: SurveyRow };

async function readAll(actor: Actor, query: CandidateQuery): Promise<Loaded[]> {
  const survey = query.survey === undefined ? null : await findSurvey(actor, query.survey);
  const rows = await CompanionRow.findAll({
    where: { collaborationId: actor.collaborationId },
    include: [
      {
        model: TargetRow,
        as: 'target',
        required: true,
        ...(survey && { where: { surveyId: survey.id } }),
        include: [{ model: SurveyRow, as: 'survey', required: true, where: notWithdrawn() }],
      },
    ],
    order: [literal('"target"."folded_name"'), ['foldedName', 'ASC'], ['id', 'ASC']],
  });
  return rows.map((row) => {
    const { target } = row as CompanionRow & { target: TargetRow & { survey: SurveyRow } };
    return { row, target, survey: target.survey };
  });
}

const inOrder = (all: Loaded[], ranges: LeadRanges) =>
  all
    .map((one) => ({ one, rank: urgency(one.row.status, ranges.covers(one.row, one.target)) }))
    .sort((a, b) => a.rank - b.rank)
    .map(({ one }) => one);

type CandidatesAsked = CandidateQuery & Pick<PageAsked, 'after'>;

/** Candidates of all surveys, those that wait for a person first. */
export async function listCandidates(actor: Actor, query: CandidatesAsked): Promise<CandidateList> {
  demand(actor, 'read');
  const key = `candidates ${actor.collaborationId} ${JSON.stringify(query)}`;
  return together(key, () => readCandidates(actor, query));
}

/** The same for every member. */
async function readCandidates(actor: Actor, query: CandidatesAsked): Promise<CandidateList> {
  const [all, ranges] = await Promise.all([readAll(actor, query), leadRanges(actor)]);
  const { status } = query;
  const asked = all.filter(({ row }) => status === undefined || row.status === status);
  const page = pageOf(inOrder(asked, ranges), query, ({ row }) => row.id);
  const counted = await countsOf(page.map(({ row }) => row.id));
  const counts = companionStatusSchema.options.map((name) => [
    name,
    all.filter(({ row }) => row.status === name).length,
  ]);
  return {
    candidates: page.map((found) => describeCandidate(found, counted(found.row.id), ranges)),
    total: asked.length,
    counts: Object.fromEntries(counts),
    lead: ranges.key,
  };
}
