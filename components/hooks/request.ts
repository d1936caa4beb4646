import type { ZodType } from 'zod';
import { ApiProblem, readProblem } from './api-problem';

interface Sent {
  /** Sent as JSON. */
  body?: unknown;
  /** Sent as it is, with its own type. */
  content?: Blob;
  signal?: AbortSignal;
}

/**
 * What changes an existing thing, or deletes what several people write, names the state that it was
 * shown in: `change` and `removeShown` find it.
 */
export type RequestOptions = Sent &
  (
    | { method?: 'GET' | 'POST' }
    | { method: 'DELETE'; ifMatch?: string }
    | { method: 'PATCH'; ifMatch: string }
  );

/** A schema, or what loads it: asked for at the same time as the answer that it reads. */
export type AnswerSchema<T> = ZodType<T> | (() => Promise<ZodType<T>>);

/**
 * Asks the server and reads the answer by its schema.
 *
 * @throws ApiProblem for a refusal, an unreachable server, and an answer of another shape
 */
export async function request<T>(
  path: string,
  schema: AnswerSchema<T>,
  options: RequestOptions = {},
): Promise<T> {
  return (await requestTagged(path, schema, options)).value;
}

/** The same with the tag of the state that was answered; null where the answer has none. */
export async function requestTagged<T>(
  path: string,
  schema: AnswerSchema<T>,
  options: RequestOptions = {},
): Promise<{ value: T; etag: string | null }> {
  const [response, reader] = await Promise.all([
    send(path, options),
    typeof schema === 'function' ? schema() : schema,
  ]);
  const parsed = reader.safeParse(await response.json());
  if (parsed.success) return { value: parsed.data, etag: response.headers.get('etag') };
  const issue = parsed.error.issues[0];
  throw new ApiProblem({
    type: 'about:blank',
    title: 'Unexpected answer',
    status: response.status,
    code: 'unexpected-answer',
    detail: `The server's answer has an unexpected ${issue.path.join('.') || 'shape'}: ${issue.message}. The page may be older than the server: reload it.`,
  });
}

/** The same for an answer without content. */
export async function requestNothing(path: string, options: RequestOptions): Promise<void> {
  await send(path, options);
}

/** The same for numbers sent as bytes. */
export async function requestBytes(
  path: string,
  options: RequestOptions = {},
): Promise<ArrayBuffer> {
  const response = await send(path, options, 'application/octet-stream');
  return response.arrayBuffer();
}

/** The same for a file that the server makes. */
export async function requestFile(path: string, options: RequestOptions): Promise<Blob> {
  const response = await send(path, options, '*/*');
  return response.blob();
}

async function send(
  path: string,
  options: RequestOptions,
  accept = 'application/json',
): Promise<Response> {
  const { method = 'GET', body, content, signal } = options;
  const headers: Record<string, string> = { accept };
  if (body !== undefined) headers['content-type'] = 'application/json';
  if (content !== undefined) headers['content-type'] = content.type;
  if ('ifMatch' in options && options.ifMatch !== undefined) {
    headers['if-match'] = options.ifMatch;
  }
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      headers,
      signal,
      body: body === undefined ? content : JSON.stringify(body),
    });
  } catch (reason) {
    if (signal?.aborted) throw reason;
    throw new ApiProblem({
      type: 'about:blank',
      title: 'No answer',
      status: 0,
      code: 'no-answer',
      detail: 'No answer from the server. Check the connection and try again.',
    });
  }
  if (!response.ok) throw await readProblem(response);
  return response;
}
