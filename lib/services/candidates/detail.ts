import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { julianYearOf } from '@/lib/quantities/earth-position';
import type { CandidateDetail, ObservationView, VerdictView } from '@/lib/schemas/candidates';
import { CompanionObservationRow, CompanionVerdictRow, PersonRow, UploadRow } from '@/models';
import { isLead } from '../surveys';
import { describeCandidate, statedOf } from './describe';
import { estimateAxis, estimateMass } from './estimates';
import { findCandidate } from './find';
import { epochsElsewhere, withAdopted } from './host';
import { leadRanges } from './lead-ranges';
import { motionOf, testHypotheses } from './motion';

/** Epochs of a candidate in order of time. */
export const observationsOf = (companionId: string) =>
  CompanionObservationRow.findAll({
    where: { companionId },
    order: [
      ['observedOn', 'ASC'],
      ['band', 'ASC NULLS FIRST'],
    ],
  });

interface Names {
  person(id: string | null): string | null;
  file(id: string | null): { name: string; by: string | null } | null;
}

async function namesFor(
  rows: { createdBy: string | null; uploadId: string | null }[],
): Promise<Names> {
  const uploads = await UploadRow.findAll({
    attributes: ['id', 'fileName', 'uploadedBy'],
    where: { id: rows.flatMap(({ uploadId }) => uploadId ?? []) },
  });
  const people = await PersonRow.findAll({
    attributes: ['id', 'name'],
    where: {
      id: [
        ...rows.flatMap(({ createdBy }) => createdBy ?? []),
        ...uploads.flatMap(({ uploadedBy }) => uploadedBy ?? []),
      ],
    },
  });
  const person = (id: string | null) => people.find((one) => one.id === id)?.name ?? null;
  return {
    person,
    file: (id) => {
      const upload = uploads.find((one) => one.id === id);
      return upload ? { name: upload.fileName, by: person(upload.uploadedBy) } : null;
    },
  };
}

function describeObservation(
  { row, survey }: { row: CompanionObservationRow; survey: string | null },
  names: Names,
): ObservationView {
  return {
    id: row.id,
    ...(survey !== null && { survey }),
    observedOn: row.observedOn,
    julianYear: julianYearOf(row.observedOn),
    separationArcsec: row.separationArcsec,
    separationErrorArcsec: row.separationErrorArcsec,
    positionAngleDeg: row.positionAngleDeg,
    positionAngleErrorDeg: row.positionAngleErrorDeg,
    band: row.band,
    contrastMag: row.contrastMag,
    contrastErrorMag: row.contrastErrorMag,
    source: row.source,
    isFromFile: row.uploadId !== null,
    by: names.person(row.createdBy) ?? names.file(row.uploadId)?.by ?? null,
  };
}

function describeVerdict(row: CompanionVerdictRow, names: Names): VerdictView {
  const file = names.file(row.uploadId);
  return {
    ...statedOf(row),
    number: row.number,
    isProposal: row.isProposal,
    massFrom: row.massFrom,
    semiMajorAxisFrom: row.semiMajorAxisFrom,
    reason: row.reason,
    file: file?.name ?? null,
    by: names.person(row.createdBy) ?? file?.by ?? null,
    at: row.createdAt.toISOString(),
  };
}

/** Proposals that no decision has followed yet. */
export function openProposals(verdicts: Pick<CompanionVerdictRow, 'isProposal'>[]): number {
  return verdicts.reduce((open, { isProposal }) => (isProposal ? open + 1 : 0), 0);
}

/** A candidate with its epochs, what they say of its motion, its mass and axis, and its history. */
export async function getCandidate(actor: Actor, id: string): Promise<CandidateDetail> {
  const found = await findCandidate(actor, id);
  const { row, target, survey } = found;
  const [observations, verdicts, ranges] = await Promise.all([
    observationsOf(row.id),
    CompanionVerdictRow.findAll({ where: { companionId: row.id }, order: [['number', 'ASC']] }),
    leadRanges(actor),
  ]);
  const elsewhere = await epochsElsewhere(found);
  const { found: hosted, adopted } = await withAdopted(found);
  const seen = [...observations.map((one) => ({ row: one, survey: null })), ...elsewhere].sort(
    (a, b) => (a.row.observedOn < b.row.observedOn ? -1 : 1),
  );
  const names = await namesFor([...seen.map((one) => one.row), ...verdicts]);
  // Mass and axis rest on the survey's own epochs: the host's magnitudes are the survey's.
  const mass = await estimateMass(hosted, observations);
  const axis = estimateAxis(hosted, observations);
  const { motion, motionMissing } = motionOf(hosted.target);
  const counts = { observations: observations.length, proposals: openProposals(verdicts) };
  return {
    ...describeCandidate(found, counts, ranges),
    target: {
      id: target.id,
      starId: target.starId,
      distancePc:
        hosted.target.distancePc ??
        (hosted.target.parallaxMas ? 1000 / hosted.target.parallaxMas : null),
      ageMyr: hosted.target.ageMyr,
      adopted,
    },
    reference: row.reference,
    history: verdicts.map((verdict) => describeVerdict(verdict, names)),
    seen: seen.map((one) => describeObservation(one, names)),
    motion,
    motionMissing,
    hypotheses: testHypotheses(
      motion,
      seen.map((one) => one.row),
    ),
    mass: mass.estimate,
    massMissing: mass.missing,
    axis: axis.estimate,
    axisMissing: axis.missing,
    can: {
      vet: survey.shareId === null && may(actor, 'vet', { isLead: isLead(actor, survey) }),
      propose: survey.shareId === null && may(actor, 'write-note'),
    },
  };
}
