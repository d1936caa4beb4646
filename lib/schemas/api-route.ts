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
  status?: number;
  answer?: ZodType;
  /** Content types of an answer that is a file or bytes, besides JSON. */
  files?: readonly string[];
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
