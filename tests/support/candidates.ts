import { expect } from 'vitest';
import { GET as getCandidate } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/route';
import type { POST as giveVerdict } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/verdicts/route';
import { type CandidateDetail, candidateDetailSchema } from '@/lib/schemas/candidates';
import { roleSchema } from '@/lib/schemas/common';
import type { CompanionRow } from '@/models';
import { addMember, bearer, call, createCollaborationWith, createPerson, tokenOf } from './people';
import { buildCompanion, buildSurvey, buildTarget, SMALL_GRID } from './sample';

export const MOTION = { pmRaMasYr: 85.2, pmDecMasYr: -61.7 };
/** A measured place beside the star, as the form sends it. */
export const epochOf = (
  observedOn: string,
  separationArcsec: number,
  positionAngleDeg: number,
) => ({
  observedOn,
  separationArcsec,
  separationErrorArcsec: 0.004,
  positionAngleDeg,
  positionAngleErrorDeg: 0.3,
});

/** A survey whose maps are cut at candidates, one star of it, and the ways to its candidates. */
export async function openCandidates() {
  const { collaboration, people } = await createCollaborationWith(roleSchema.options);
  const lead = await createPerson();
  await addMember(collaboration, lead, ['collaborator']);
  const survey = await buildSurvey(collaboration.id, {
    leadId: lead.id,
    mapSettings: { ...SMALL_GRID, candidates: 'cut' },
  });
  const target = await buildTarget(survey, {
    name: 'Host',
    raDeg: 309.35,
    decDeg: -8.3,
    distancePc: null,
    distanceErrorPc: null,
    parallaxMas: 21.5,
    parallaxErrorMas: 0.05,
    attributes: MOTION,
  });
  const owner = bearer(await tokenOf(people.owner, collaboration));

  let made = 0;
  const candidate = (given: Partial<CompanionRow['dataValues']> = {}) =>
    buildCompanion(target, {
      name: `cc${++made}`,
      status: 'candidate',
      massMjup: null,
      semiMajorAxisAu: null,
      ...given,
    });

  const paramsOf = (row: CompanionRow, more: Record<string, string> = {}) => ({
    collaboration: collaboration.slug,
    candidate: row.id,
    ...more,
  });

  async function post(
    handler: typeof giveVerdict,
    row: CompanionRow,
    body: unknown,
    headers = owner,
  ): Promise<Response> {
    return call(handler, { method: 'POST', headers, params: paramsOf(row), body });
  }

  async function detailOf(response: Response, status = 201): Promise<CandidateDetail> {
    const body = await response.json();
    expect([response.status, body.detail]).toEqual([status, undefined]);
    return candidateDetailSchema.parse(body);
  }

  const read = async (row: CompanionRow) =>
    detailOf(await call(getCandidate, { headers: owner, params: paramsOf(row) }), 200);

  return {
    collaboration,
    people,
    lead,
    survey,
    target,
    owner,
    candidate,
    paramsOf,
    post,
    detailOf,
    read,
  };
}
