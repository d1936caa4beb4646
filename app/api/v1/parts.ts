import { InputError, LabError } from '@/lib/errors';
import type { UnfinishedFileView } from '@/lib/schemas/uploads';

/** The version of the tus protocol (tus.io, "Core protocol" and "Creation"). */
const VERSION = '1.0.0';

/** Content type of a part, as that protocol names it. */
const PART_TYPE = 'application/offset+octet-stream';

/** @throws LabError, 412, where the sender speaks another version of the protocol */
export function requireVersion({ headers }: Request): void {
  const given = headers.get('tus-resumable');
  if (given === null || given === VERSION) return;
  throw new LabError('tus-version', 412, `Tus-Resumable: expected ${VERSION}`);
}

export const isPart = ({ headers }: Request): boolean =>
  headers.get('content-type')?.split(';')[0].trim().toLowerCase() === PART_TYPE;

/** @throws InputError, 415 */
export function requirePart(request: Request): void {
  if (isPart(request)) return;
  throw new InputError(
    { code: 'content-type', item: 'header', expected: PART_TYPE },
    { status: 415 },
  );
}

/**
 * A number of bytes that a header states.
 *
 * @throws InputError, 400, where it is missing or no whole number
 */
export function bytesIn({ headers }: Request, name: 'Upload-Length' | 'Upload-Offset'): number {
  const given = headers.get(name);
  if (given !== null && /^\d{1,15}$/.test(given)) return Number(given);
  throw new InputError(
    {
      code: given === null ? 'value-missing' : 'value-out-of-range',
      item: `header "${name}"`,
      found: given === null ? 'nothing' : `"${given.slice(0, 40)}"`,
      expected: 'a whole number of bytes',
    },
    { status: 400 },
  );
}

/** Where a file stands, in the headers of the protocol. */
export const standing = ({ byteLength, received }: UnfinishedFileView) => ({
  'Tus-Resumable': VERSION,
  'Upload-Offset': String(received),
  'Upload-Length': String(byteLength),
});
