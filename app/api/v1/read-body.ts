import { InputError, LabError } from '@/lib/errors';

/** Bodies are settings and lists of names; files go to uploads. */
const LONGEST_BODY_BYTES = 1_000_000;

/** Refuses a body that does not say it is JSON: 415. */
export function requireJsonType(request: Request): void {
  const given = request.headers.get('content-type') ?? '';
  if (given.split(';')[0].trim().toLowerCase() === 'application/json') return;
  throw new InputError(
    {
      code: 'content-type',
      item: 'header',
      found: given === '' ? 'no content type' : `"${given.slice(0, 40)}"`,
      expected: 'application/json',
    },
    { status: 415 },
  );
}

async function readBytes(request: Request, longest: number): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  let length = 0;
  const reader = request.body?.getReader();
  while (reader) {
    const { done, value } = await reader.read();
    if (done) break;
    length += value.length;
    if (length > longest) {
      await reader.cancel();
      throw new LabError('too-large', 413, `body: expected at most ${longest} bytes`);
    }
    parts.push(value);
  }
  return Buffer.concat(parts, length);
}

/** The body as JSON, length checked while it comes in. */
export async function readJson(request: Request): Promise<unknown> {
  const bytes = await readBytes(request, LONGEST_BODY_BYTES);
  const declared = request.headers.get('content-length');
  if (declared !== null && Number(declared) !== bytes.length) {
    throw new InputError(
      {
        code: 'truncated',
        item: 'body',
        found: `${bytes.length} bytes`,
        expected: `the ${declared.slice(0, 20)} that the header promises`,
      },
      { status: 400 },
    );
  }
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch (error) {
    const isText = error instanceof SyntaxError;
    throw new InputError(
      {
        code: isText ? 'json-invalid' : 'not-utf8',
        item: 'body',
        message: isText ? 'The body is not JSON' : 'The body is not UTF-8',
      },
      { status: 400 },
    );
  }
}

/** The body as text of one content type, length checked while it comes in. */
export async function readText(
  request: Request,
  contentType: string,
  longestBytes: number,
): Promise<string> {
  const given = request.headers.get('content-type') ?? '';
  if (given.split(';')[0].trim().toLowerCase() !== contentType) {
    throw new InputError(
      {
        code: 'content-type',
        item: 'header',
        found: given === '' ? 'no content type' : `"${given.slice(0, 40)}"`,
        expected: contentType,
      },
      { status: 415 },
    );
  }
  return new TextDecoder().decode(await readBytes(request, longestBytes));
}
