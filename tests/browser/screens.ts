import type { APIRequestContext } from '@playwright/test';

/** Slug of the collaboration that the seed writes. */
export const LAB = '/breakwater';

/** Screens for whoever comes by. */
export const openScreens = [
  '/sign-in',
  '/sign-in/link',
  '/sign-in/link/no-such-link',
  '/sign-up',
  '/reset',
  '/reset/no-such-link',
  '/join/no-such-invitation',
  '/mail/stop/no-such-link',
  '/help',
  '/help/exposure',
  '/api-guide',
  '/api-guide/surveys',
  '/api-guide/shapes',
  '/r/{code}',
];

/** Screens of a collaboration, for its owner; in braces what only the seed's rows tell. */
export const labScreens = [
  LAB,
  ...[
    'surveys',
    'surveys/new',
    'surveys/halyard',
    'surveys/halyard/import',
    'surveys/combine',
    'populations',
    'populations/P-1',
    'populations/new',
    'analyses',
    'analyses/new',
    'analyses/A-1',
    'analyses/A-1/calibration',
    'analyses/A-1/studies/systematics',
    'analyses/A-1/studies/ages-cooling',
    'analyses/A-1/studies/influence',
    'analyses/A-1/studies/limit-map',
    'analyses/A-1/studies/sweep',
    'analyses/A-1/studies/free-indices',
    'analyses/A-1/studies/population-comparison',
    'analyses/A-1/studies/counts',
    'analyses/A-1/studies/overlap-rules',
    'compare?with=A-1,A-2',
    'forecasts',
    'forecasts/new',
    'forecasts/{forecast}',
    'stars',
    'stars/{star}',
    'stars/overlaps',
    'stars/ages',
    'stars/samples',
    'candidates',
    'candidates/{candidate}',
    'cooling',
    'maps',
    'releases',
    'releases/new?run={run}',
    'releases/freeze/{run}',
    'releases/R-1',
    'releases/R-2/edit',
    'exercises',
    'exercises/new',
    'exercises/E-1',
    'activity',
    'people',
    'settings',
    'settings/work',
    'log',
    'me',
    'me/tokens',
  ].map((rest) => `${LAB}/${rest}`),
  '/welcome',
];

/** Where the id stands that an address has in braces. */
const ids: Record<string, { route: string; list?: string; field?: string }> = {
  candidate: { route: 'candidates?limit=1', list: 'candidates' },
  code: { route: 'releases/R-1', field: 'code' },
  forecast: { route: 'studies?kind=forecast', list: 'studies' },
  run: { route: 'analyses/A-1', list: 'runs' },
  star: { route: 'stars?limit=1', list: 'stars' },
};

/**
 * The address of a screen with the ids of this product's rows.
 *
 * @param request of somebody who is signed in
 */
export async function addressOf(request: APIRequestContext, screen: string): Promise<string> {
  const name = /\{(\w+)\}/.exec(screen)?.[1];
  if (name === undefined) return screen;
  const { route, list, field = 'id' } = ids[name];
  // The server may close a connection that rested just as it is taken up again.
  const answer = await request.get(`/api/v1/collaborations${LAB}/${route}`, { maxRetries: 2 });
  const body = await answer.json();
  const id = (list === undefined ? body : body[list]?.[0])?.[field];
  if (typeof id !== 'string') throw new Error(`${route} tells no ${name}`);
  return screen.replace(`{${name}}`, id);
}

/** "breakwater-surveys-new": what a file of a screen is called. */
export const fileNameOf = (screen: string) =>
  screen.replaceAll(/[^\w.-]+/g, '-').replaceAll(/^-|-$/g, '');
