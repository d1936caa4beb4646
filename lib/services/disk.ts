import { mkdir, readdir, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { config } from '@/lib/config';
import { LabError } from '@/lib/errors';

/** What the system says where a disk, a quota or the largest file of an account is used up. */
const FULL = new Set(['ENOSPC', 'EDQUOT', 'EFBIG']);

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

/** Removes files that nobody has written to for so long. */
export async function sweepFolder(folder: string, abandonedMs: number): Promise<void> {
  for (const name of await readdir(folder)) {
    const file = path.join(folder, name);
    const seen = await stat(file).catch(() => null);
    if (seen && Date.now() - seen.mtimeMs > abandonedMs) await rm(file, { force: true });
  }
}

/**
 * A folder of files on their way in, swept.
 *
 * @throws LabError, 507, where the disk has no room for it
 */
export async function sweptFolder(name: string, abandonedMs: number): Promise<string> {
  const folder = path.resolve(config().dataDirectory, name);
  try {
    await mkdir(folder, { recursive: true });
  } catch (error) {
    throw noRoomFor(error) ?? error;
  }
  await sweepFolder(folder, abandonedMs);
  return folder;
}
