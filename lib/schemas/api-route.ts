import { type ZodObject, type ZodType, z } from 'zod';

export type ApiMethod = 'get' | 'post' | 'patch' | 'delete';

/** One method of one address: what it takes, what it answers, who may ask. */
export interface ApiRoute {
  method: ApiMethod;
  path: string;
  summary: string;
  /** A token's scope; `session` needs a signed-in person, `open` nobody. */
  access: 'read' | 'write' | 'run' | 'session' | 'open';
  query?: ZodObject;
  body?: ZodType;
  /** The body is a file, streamed. */
  isUpload?: boolean;
  /** Content type of that file, where it is a fixed one. */
  uploadType?: string;
  /** Headers that it asks for besides those of all routes: what each says, with an example. */
  headers?: Readonly<Record<string, { says: string; example: string }>>;
  status?: number;
  answer?: ZodType;
  /** Content types of an answer that is a file or bytes, besides JSON. */
  files?: readonly string[];
  /** What it answers is told once: no Idempotency-Key keeps it. */
  tellsSecret?: boolean;
}

export const team = '/api/v1/collaborations/{collaboration}';
export const listOf = <Key extends string>(key: Key, schema: ZodType) =>
  z.object({ [key]: z.array(schema) });

type Rest = Omit<ApiRoute, 'method' | 'path' | 'summary' | 'access'>;
type Access = ApiRoute['access'];
export const route = (
  method: ApiMethod,
  path: string,
  access: Access,
  summary: string,
  rest: Rest = {},
): ApiRoute => ({ method, path, access, summary, ...rest });

const ofTeam = ({ path }: ApiRoute) => path === team || path.startsWith(`${team}/`);

/** Whether the answer is a list that is read page by page. */
export const isPaged = ({ query }: ApiRoute): boolean =>
  query !== undefined && 'cursor' in query.shape && 'offset' in query.shape;

/** Whether the answer to the first of two equal writes is kept for the second. */
export const takesKey = (one: ApiRoute): boolean =>
  one.method === 'post' && ofTeam(one) && !one.isUpload && !one.tellsSecret;

/** Whether a write may ask that nothing has changed: where reading the same address gives a tag. */
export const takesIfMatch = (one: ApiRoute, all: readonly ApiRoute[]): boolean =>
  (one.method === 'patch' || one.method === 'delete') &&
  (ofTeam(one) || one.method === 'patch') &&
  all.some(({ method, path, answer }) => method === 'get' && path === one.path && answer);
