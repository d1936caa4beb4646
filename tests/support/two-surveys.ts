import { expect } from 'vitest';
import { GET as listStars } from '@/app/api/v1/collaborations/[collaboration]/stars/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import { roleSchema } from '@/lib/schemas/common';
import { starListSchema } from '@/lib/schemas/stars';
import { actorOf, bearer, call, createCollaborationWith, tokenOf } from './people';
import { buildAnalysis, buildPopulation, buildSurvey, buildTarget, recipeOf } from './sample';
import { askForMaps, runToEnd, untilEnded } from './work';

const motion = { refEpoch: 2016, pmRaMasYr: 300, pmDecMasYr: -200 };

/**
 * Two surveys with maps and an analysis of both: three stars and Alpha in the first, Alpha by another
 * name and one of the three in the second. It wants a worker.
 */
export async function buildTwoSurveys() {
  const { collaboration, people } = await createCollaborationWith(roleSchema.options);
  const owner = await actorOf(people.owner, collaboration);
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const first = await buildSurvey(collaboration.id, {
    name: 'First',
    leadId: people.collaborator.id,
  });
  const second = await buildSurvey(collaboration.id, { name: 'Second' });
  for (let i = 1; i <= 3; i++) await buildTarget(first, { name: `Star ${i}` });
  // One star by its place: 300 mas/yr over 16 years, and 1.5 arcsec beside that.
  await buildTarget(first, {
    name: 'Alpha',
    raDeg: 80,
    decDeg: -60,
    spectralType: 'K4',
    attributes: motion,
  });
  await buildTarget(second, {
    name: 'Twin of Alpha',
    raDeg: 80 - (300 * 16) / 3.6e6 / Math.cos(Math.PI / 3),
    decDeg: -60 + (200 * 16 + 1500) / 3.6e6,
    distancePc: 25.5,
    spectralType: 'K5',
    curves: [{ contrastMag: [7.5, 10, 12, 13.5, 14.4, 14.6] }],
  });
  await buildTarget(second, { name: 'Star 2', ageMyr: 24, ageLowerMyr: 21, ageUpperMyr: 27 });
  for (const survey of [first, second]) await untilEnded(await askForMaps(survey));
  const population = await buildPopulation(collaboration.id);
  const both = await buildAnalysis(
    collaboration.id,
    recipeOf([first, second], population),
    owner.personId,
  );
  return {
    collaboration,
    people,
    owner,
    headers,
    first,
    second,
    population,
    both,
    /** Asks a handler, by the owner unless others are named; a body makes it a POST. */
    ask: (
      handler: RouteHandler,
      params: Record<string, string> = {},
      body?: unknown,
      by: Record<string, string> = headers,
    ) =>
      call(handler, {
        method: body === undefined ? 'GET' : 'POST',
        params: { collaboration: collaboration.slug, ...params },
        headers: by,
        body,
      }),
    async runBoth() {
      const { run, job } = await runToEnd(owner, `A-${both.number}`);
      expect(job.fault).toBeNull();
      return run;
    },
    list: async (search: string) => {
      const params = { collaboration: collaboration.slug };
      const response = await call(listStars, { params, headers, path: `/?${search}` });
      return starListSchema.parse(await response.json());
    },
  };
}
