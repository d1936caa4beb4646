import { readdirSync } from 'node:fs';
import path from 'node:path';
import { apiRoutes } from '@/lib/schemas/api-routes';
import type { RunningProduct } from './row';

export const LAB = 'breakwater';
const TEAM = '/api/v1/collaborations/{collaboration}';
const PAGES = 'app/(lab)/[collaboration]';

/** What lists that need to be told something are asked. */
const questions: Record<string, string> = {
  [`${TEAM}/search`]: '?q=hal',
};
/** Of things that have many notes or none: asked with their page. */
const OF_ONE_THING = [`${TEAM}/notes`];

/** Every address of the API that reads a whole list of the collaboration, as the API describes itself. */
export function listAddresses(): string[] {
  return apiRoutes
    .filter(({ method, access, files }) => method === 'get' && access === 'read' && !files)
    .map(({ path: address }) => address)
    .filter((address) => address.startsWith(TEAM) && !address.slice(TEAM.length).includes('{'))
    .filter((address) => !OF_ONE_THING.includes(address))
    .map((address) => address.replace('{collaboration}', LAB) + (questions[address] ?? ''));
}

/** Every page of the collaboration that has an address of its own, whatever is stored. */
export function pageAddresses(root: string): string[] {
  const folder = path.join(root, PAGES);
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((file) => path.basename(file) === 'page.tsx' && !file.includes('['))
    .map((file) => path.posix.join('/', LAB, path.dirname(file)))
    .sort();
}

/** Pages of one thing: the first survey, star and analysis of the lists. */
export async function thingPages(product: RunningProduct, cookie: string): Promise<string[]> {
  const read = async (route: string) => {
    const address = `${product.address}/api/v1/collaborations/${LAB}/${route}`;
    return (await fetch(address, { headers: { cookie } })).json();
  };
  const { surveys } = (await read('surveys')) as { surveys: { slug: string }[] };
  const { stars } = (await read('stars?limit=1')) as { stars: { id: string }[] };
  const { analyses } = (await read('analyses')) as { analyses: { key: string }[] };
  return [
    `/${LAB}/surveys/${surveys[0].slug}`,
    `/${LAB}/stars/${stars[0].id}`,
    `/${LAB}/analyses/${analyses[0].key}`,
  ];
}
