import { createHash, randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { open, readdir, rm, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Actor } from '@/lib/access/actor';
import { Conflict, InputError, LabError, NotFound } from '@/lib/errors';
import { uploadLimits } from '@/lib/formats';
import { idSchema } from '@/lib/schemas/common';
import type { UnfinishedFileView } from '@/lib/schemas/uploads';
import { noRoomFor, sweptFolder } from './disk';
import { digestFault, type IncomingFile, statedDigest, tooLarge } from './incoming-file';

/** A file whose sender has stopped is kept so long. */
const KEPT_MS = 24 * 60 * 60_000;

/** Unfinished files of one person in one collaboration. */
const MOST_FILES = 8;

interface Unfinished extends UnfinishedFileView {
  path: string;
}

/** The parts that are being received in this process, so that a newer sender ends an older one. */
const receiving = new Map<string, { stop: AbortController; ended: Promise<unknown> }>();

const ownerOf = ({ collaborationId, personId }: Actor) =>
  createHash('sha256').update(`${collaborationId} ${personId}`).digest('hex').slice(0, 32);

/** Files by owner, id and whole length, which their names say: what has come is their length. */
async function listOwn(actor: Actor): Promise<Unfinished[]> {
  const folder = await sweptFolder('unfinished', KEPT_MS);
  const owner = `${ownerOf(actor)}_`;
  const files = (await readdir(folder)).filter((name) => name.startsWith(owner));
  const known = await Promise.all(
    files.map(async (name) => {
      const [, id, byteLength] = name.split('_');
      const filePath = path.join(folder, name);
      const seen = await stat(filePath).catch(() => null);
      return seen && { id, byteLength: Number(byteLength), received: seen.size, path: filePath };
    }),
  );
  return known.filter((file) => file !== null);
}

/** @throws NotFound for everything but a file that this person began in this collaboration */
async function findOwn(actor: Actor, id: string): Promise<Unfinished> {
  const isId = idSchema.safeParse(id).success;
  const found = isId ? (await listOwn(actor)).find((file) => file.id === id) : undefined;
  if (!found) throw new NotFound('unfinished file');
  return found;
}

const viewOf = ({ path: _, ...view }: Unfinished): UnfinishedFileView => view;

/** Begins a file that is sent part by part; the actor was asked already whether they may import. */
export async function beginFile(actor: Actor, byteLength: number): Promise<UnfinishedFileView> {
  if (byteLength > uploadLimits.uploadBytes) throw tooLarge(byteLength);
  const folder = await sweptFolder('unfinished', KEPT_MS);
  if ((await listOwn(actor)).length >= MOST_FILES) {
    throw new Conflict(
      `${MOST_FILES} files of yours are unfinished: send their rest, or remove one, and begin again`,
    );
  }
  const id = randomUUID();
  const filePath = path.join(folder, [ownerOf(actor), id, byteLength].join('_'));
  await writeFile(filePath, '', { flag: 'wx', mode: 0o600 });
  return { id, byteLength, received: 0 };
}

export async function getUnfinished(actor: Actor, id: string): Promise<UnfinishedFileView> {
  return viewOf(await findOwn(actor, id));
}

export async function removeUnfinished(actor: Actor, id: string): Promise<void> {
  const { path: filePath } = await findOwn(actor, id);
  receiving.get(filePath)?.stop.abort();
  await rm(filePath, { force: true });
}

const beyond = ({ byteLength, received }: Unfinished) =>
  new InputError(
    {
      code: 'too-large',
      item: 'body',
      found: `bytes beyond the ${byteLength} of the file`,
      expected: `at most ${byteLength - received} bytes`,
    },
    { status: 413 },
  );

/** Each piece is on the disk before the next is asked for: what has come stays, however it ends. */
async function append(file: Unfinished, body: ReadableStream<Uint8Array>, signal: AbortSignal) {
  const handle = await open(file.path, 'r+');
  const reader = body.getReader();
  const stop = () => reader.cancel().catch(() => undefined);
  signal.addEventListener('abort', stop);
  try {
    let at = file.received;
    for (;;) {
      const { done, value } = await reader.read();
      signal.throwIfAborted();
      if (done) return;
      if (at + value.length > file.byteLength) throw beyond(file);
      const { bytesWritten } = await handle.write(value, 0, value.length, at);
      if (bytesWritten < value.length) throw Object.assign(new Error(), { code: 'ENOSPC' });
      at += bytesWritten;
    }
  } finally {
    signal.removeEventListener('abort', stop);
    await handle.close();
  }
}

/**
 * Adds a part where the file ends so far. What came before a connection broke stays.
 *
 * @throws Conflict where the part begins elsewhere; the sender asks how much has come, and goes on
 */
export async function appendPart(
  actor: Actor,
  id: string,
  offset: number,
  request: Request,
): Promise<UnfinishedFileView> {
  const { path: filePath } = await findOwn(actor, id);
  const older = receiving.get(filePath);
  older?.stop.abort();
  await older?.ended;
  const file = await findOwn(actor, id);
  if (file.received !== offset) {
    throw new Conflict(`${file.received} bytes have come; this part begins at ${offset}`);
  }
  if (request.body === null) return viewOf(file);
  const stop = new AbortController();
  const work = append(file, request.body, stop.signal);
  const own = { stop, ended: work.catch(() => null) };
  receiving.set(filePath, own);
  try {
    await work;
  } catch (error) {
    if (error instanceof LabError) throw error;
    throw noRoomFor(error) ?? cutOff(await findOwn(actor, id));
  } finally {
    if (receiving.get(filePath) === own) receiving.delete(filePath);
  }
  return getUnfinished(actor, id);
}

const cutOff = ({ received, byteLength }: Unfinished) =>
  new InputError(
    {
      code: 'truncated',
      item: 'body',
      found: `the end of the connection after ${received} bytes`,
      expected: `${byteLength} bytes`,
      hint: 'What has come is kept; go on from there',
    },
    { status: 400 },
  );

/**
 * The whole file, hashed, once all of it has come.
 *
 * @throws Conflict while a part is missing; InputError `checksum` where the stated SHA-256 differs
 */
export async function takeFinished(
  actor: Actor,
  id: string,
  headers: Headers,
): Promise<IncomingFile> {
  const { path: filePath, byteLength, received } = await findOwn(actor, id);
  if (received < byteLength)
    throw new Conflict(`Only ${received} of ${byteLength} bytes have come`);
  const stated = statedDigest(headers);
  const hash = createHash('sha256');
  await pipeline(createReadStream(filePath), hash);
  const sha256 = hash.digest('hex');
  const discard = () => rm(filePath, { force: true });
  if (stated !== null && stated !== sha256) {
    await discard();
    throw digestFault(sha256, stated);
  }
  return { path: filePath, byteLength, sha256, discard };
}
