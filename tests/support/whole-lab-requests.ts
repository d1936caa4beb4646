import type { RouteHandler } from '@/app/api/v1/handler';
import { type ApiRoute, apiRoutes } from '@/lib/schemas/api-routes';
import { webAddress } from './people';
import { type RoutePermission, routePermissions } from './route-permissions';
import type { LabIds } from './whole-lab';

const modules = import.meta.glob<Record<string, RouteHandler>>('/app/api/v1/**/route.ts');
const home = '/api/v1/collaborations/{collaboration}';

export interface LabRoute {
  /** Method and address behind the collaboration's. */
  name: string;
  route: ApiRoute;
  permission: RoutePermission;
  idNames: string[];
}

/** Every route within a collaboration that is described, with its row of the permission table. */
export const labRoutes: LabRoute[] = apiRoutes
  .filter(({ path }) => path === home || path.startsWith(`${home}/`))
  .map((route) => {
    const rest = route.path.slice(home.length);
    const name = `${route.method} ${rest}`;
    const idNames = [...rest.matchAll(/\{(\w+)\}/g)].map(([, one]) => one);
    return { name, route, permission: routePermissions[name], idNames };
  });

interface Sent {
  slug: string;
  /** For the address. */
  ids: LabIds;
  /** For body and question, where they are others. */
  named?: LabIds;
  headers: Record<string, string>;
}

/** Sends the request that the permission table describes. */
export async function askLab(
  { route, permission, idNames }: LabRoute,
  { slug, ids, named = ids, headers }: Sent,
): Promise<Response> {
  const { file, body, query } = permission;
  const inAddress = permission.ids?.(ids) ?? ids;
  const search = query ? `?${new URLSearchParams(query(named))}` : '';
  const json = body && JSON.stringify(body(named));
  const type = file?.type ?? (json === undefined ? undefined : 'application/json');
  const path = `/app${route.path.replace(/\{(\w+)\}/g, '[$1]')}/route.ts`;
  const handler = (await modules[path]())[route.method.toUpperCase()];
  const request = new Request(new URL(`/${search}`, webAddress()), {
    method: route.method.toUpperCase(),
    headers: { ...headers, ...permission.headers, ...(type && { 'content-type': type }) },
    body: file?.text ?? json,
  });
  const params = Object.fromEntries(idNames.map((name) => [name, inAddress[name]]));
  return handler(request, { params: Promise.resolve({ collaboration: slug, ...params }) });
}
