import { createHash } from 'node:crypto';
import { readdirSync } from 'node:fs';
import path from 'node:path';
import { type Api, Refused } from '../api';
import { countMissing, found } from '../founders';
import { longTargets } from '../long-file';
import type { Bench, Laboratory, Measured, Row } from '../row';
import { SmallDisk } from '../small-disk';
import { pause, populationBody, until } from '../work';
import { isAway } from '../writers';

const DATABASE_MB = 160;
const WITH_ROOM_MB = 400;
const INCOMING_MB = 6;
const FILE_MB = 3;
/** Requests to the full database, writes and reads in turn. */
const TRIES = 40;
/** So little write-ahead log that tables fill the disk before it does. */
const SETTINGS = { max_wal_size: '48MB', min_wal_size: '32MB' };

interface Kept {
  populations: string[];
  /** SHA-256 of each stored file by the id of its upload. */
  files: Map<string, string>;
}

/** What each refusal said, counted. */
type Said = Record<string, number>;

const codeOf = (error: unknown) => {
  if (!(error instanceof Refused)) return 'no answer';
  const { code } = JSON.parse(error.text) as { code: string };
  return `${error.status} ${code}`;
};

async function write(api: Api, number: number, kept: Kept): Promise<void> {
  if (number % 4 !== 0) {
    const name = `on a small disk ${number}`;
    await api.post('populations', populationBody(name));
    kept.populations.push(name);
    return;
  }
  const file = longTargets(number, FILE_MB);
  const { id } = await api.upload('targets', 'plover', `file-${number}.csv`, file);
  kept.files.set(id, createHash('sha256').update(file).digest('hex'));
}

/** Writes until the database's disk is full, and then goes on asking. */
async function fill(api: Api, kept: Kept): Promise<{ writes: Said; reads: Said }> {
  const [writes, reads]: Said[] = [{}, {}];
  const count = (said: Said, key: string) => {
    said[key] = (said[key] ?? 0) + 1;
  };
  for (let number = 1, full = 0; full < TRIES; number++) {
    try {
      await write(api, number, kept);
      if (full > 0) count(writes, 'stored');
    } catch (error) {
      count(writes, codeOf(error));
    }
    if (Object.keys(writes).length === 0) continue;
    full++;
    await api.read('surveys').then(
      () => count(reads, 'answered'),
      (error) => count(reads, codeOf(error)),
    );
  }
  return { writes, reads };
}

/** Files that find no room where they are received. */
async function overfill(api: Api, { folder }: Laboratory) {
  const incoming = path.join(folder, 'incoming');
  const disk = SmallDisk.mount(incoming, INCOMING_MB);
  try {
    const send = (number: number, megabytes: number) =>
      api.upload('targets', 'plover', 'large.csv', longTargets(number, megabytes));
    const refusal = await send(9001, 2 * INCOMING_MB).then(() => 'stored', codeOf);
    const left = readdirSync(incoming).length;
    const after = await send(9002, 1).then(() => 'stored', codeOf);
    return { refusal, left, after };
  } finally {
    disk.unmount();
  }
}

/** Read after the restart, so that the server has compared the checksum of every page. */
async function countLost(api: Api, databaseUrl: string, { populations, files }: Kept) {
  const names = { table: 'population', column: 'name', names: populations };
  let lost = await countMissing(databaseUrl, names);
  for (const [id, sha256] of files) {
    const bytes = new Uint8Array(await (await api.ask(`uploads/${id}/file`)).arrayBuffer());
    if (createHash('sha256').update(bytes).digest('hex') !== sha256) lost++;
  }
  return lost;
}

/** Until a write is taken again. @returns seconds */
async function untilWritable(api: Api, kept: Kept, number: number): Promise<number> {
  const start = Date.now();
  await until('the database takes writes again', async () => {
    try {
      await write(api, number, kept);
      return true;
    } catch (error) {
      if (!isAway(error)) throw error;
      await pause(200);
      return false;
    }
  });
  return Number(((Date.now() - start) / 1000).toFixed(1));
}

const isHonest = (said: Said) =>
  Object.keys(said).every((key) =>
    ['stored', 'answered', '503 disk-full', '503 unavailable', 'no answer'].includes(key),
  );

async function measure({ laboratory: open, folder, say }: Bench): Promise<Measured> {
  const disk = SmallDisk.mount(path.join(folder, 'database'), DATABASE_MB);
  try {
    const laboratory = await open({
      workers: 0,
      web: true,
      database: disk.folder,
      settings: SETTINGS,
    });
    const { as } = await found(laboratory, ['owner']);
    const api = as.owner;
    await api.post('surveys', { name: 'PLOVER', band: 'H' });
    const upload = await overfill(api, laboratory);
    say(`an upload without room: ${upload.refusal}, ${upload.left} files left`);
    const kept: Kept = { populations: [], files: new Map() };
    const { writes, reads } = await fill(api, kept);
    say(`full: writes ${JSON.stringify(writes)}, reads ${JSON.stringify(reads)}`);
    disk.resize(WITH_ROOM_MB);
    const againS = await untilWritable(api, kept, 10_001);
    await laboratory.kill('postgres');
    await untilWritable(api, kept, 10_002);
    const lost = await countLost(api, laboratory.databaseUrl, kept);
    const { populations, files } = kept;
    const words = (said: Said) => Object.entries(said).map(([key, count]) => `${key} ${count}`);
    return {
      isMet:
        upload.refusal === '507 disk-full' &&
        upload.left === 0 &&
        upload.after === 'stored' &&
        (writes['503 disk-full'] ?? 0) > 0 &&
        isHonest(writes) &&
        isHonest(reads) &&
        lost === 0,
      figure:
        `a file without room: ${upload.refusal}, ${upload.left} parts left; writes to the full ` +
        `database: ${words(writes).join(', ')}; reads: ${words(reads).join(', ')}; with room again ` +
        `after ${againS} s; ${lost} of ${populations.length} rows and ${files.size} files lost`,
      details: { upload, writes, reads, againS, lost },
    };
  } finally {
    disk.unmount();
  }
}

export const row: Row = {
  name: 'fault-disk',
  what: `F6: the database on a disk of ${DATABASE_MB} MB, uploads on one of ${INCOMING_MB} MB`,
  goal: '503 that says so, 507 and no partial file for uploads; nothing acknowledged is lost after space returns and a restart',
  measure,
};
