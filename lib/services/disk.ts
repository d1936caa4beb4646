import { mkdir, readdir, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { config } from '@/lib/config';
import { LabError } from '@/lib/errors';

/** What the system says where a disk, a quota or the largest file of an account is used up. */
const FULL = new Set(['ENOSPC', 'EDQUOT', 'EFBIG']);

/** No upload is written to or read for so long: the server that received this one was killed. */
const ABANDONED_MS = 60 * 60_000;

/** @returns the refusal for a file that found no room, null for any other fault */
export function noRoomFor(error: unknown): LabError | null {
  const code = (error as { code?: unknown } | null)?.code;
  if (typeof code !== 'string' || !FULL.has(code)) return null;
  return new LabError(
    'disk-full',
    507,
    'The disk for incoming files is full; nothing was stored. An owner of this server must make room',
  );
}

/** Removes what servers that were killed while they received a file have left. */
export async function sweepIncoming(folder: string): Promise<void> {
  for (const name of await readdir(folder)) {
    const file = path.join(folder, name);
    const seen = await stat(file).catch(() => null);
    if (seen && Date.now() - seen.mtimeMs > ABANDONED_MS) await rm(file, { force: true });
  }
}

/**
 * The folder of files that are being received, swept.
 *
 * @throws LabError, 507, where the disk has no room for it
 */
export async function incomingFolder(): Promise<string> {
  const folder = path.resolve(config().dataDirectory, 'incoming');
  try {
    await mkdir(folder, { recursive: true });
  } catch (error) {
    throw noRoomFor(error) ?? error;
  }
  await sweepIncoming(folder);
  return folder;
}
