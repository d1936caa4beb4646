import { createHash } from 'node:crypto';
import { closeSync, fsyncSync, mkdtempSync, openSync, readSync, rmSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { decodeMap, ENGINE_VERSION } from '@/lib/sensitivity';
import { CollaborationRow, CompletenessMapRow, database } from '@/models';
import { streamMaps } from '@/models/map-stream';
import { packMap } from '@/models/map-values';
import { createTestDatabase, dropTestDatabase } from '@/tests/support/database';
import type { Amount } from './amount';
import type { Line, Target } from './report';
import { compareTimed, wallMilliseconds } from './rounds';
import { GRID, mapSurvey } from './survey';

const READ_AT_ONCE = 200;
const SIZE = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
const TARGETS: Target[] = [
  { of: 'ratio', bound: 'at most', must: 3 },
  { of: 'max', bound: 'at most', must: 0 },
];

interface Stored {
  collaborationId: string;
  digests: string[];
  file: string;
}

const aligned = new Uint16Array(SIZE);
const alignedBytes = new Uint8Array(aligned.buffer);

/** Adds a stored map to a sum: bytes that may begin anywhere, little-endian as this machine is. */
function add(sum: Float64Array, bytes: Uint8Array): void {
  alignedBytes.set(bytes);
  for (let i = 0; i < SIZE; i++) sum[i] += aligned[i];
}

async function storeSurvey(stars: number, folder: string): Promise<Stored> {
  const { maps } = mapSurvey(stars);
  const { id: collaborationId } = await CollaborationRow.create({
    slug: `survey-${stars}`,
    name: `Survey of ${stars}`,
  });
  const file = path.join(folder, `${stars}.maps`);
  const descriptor = openSync(file, 'w');
  const digests: string[] = [];
  for (let first = 0; first < stars; first += READ_AT_ONCE) {
    const rows = [];
    for (let star = first; star < Math.min(stars, first + READ_AT_ONCE); star++) {
      const packed = packMap(decodeMap(maps.subarray(star * SIZE, (star + 1) * SIZE)));
      writeSync(descriptor, packed.nodeValues);
      const digest = createHash('sha256').update(`${stars} ${star}`).digest('hex');
      digests.push(digest);
      rows.push({
        collaborationId,
        digest,
        origin: 'computed' as const,
        engineVersion: ENGINE_VERSION,
        massMjup: [...GRID.massMjup],
        semiMajorAxisAu: [...GRID.semiMajorAxisAu],
        ...packed,
        inputs: {},
      });
    }
    await CompletenessMapRow.bulkCreate(rows);
  }
  fsyncSync(descriptor);
  closeSync(descriptor);
  return { collaborationId, digests, file };
}

/** One map after the other from a file in the page cache. */
function sumFile({ file, digests }: Stored): Float64Array {
  const sum = new Float64Array(SIZE);
  const bytes = Buffer.alloc(2 * SIZE);
  const descriptor = openSync(file, 'r');
  for (let star = 0; star < digests.length; star++) {
    readSync(descriptor, bytes, 0, bytes.length, null);
    add(sum, bytes);
  }
  closeSync(descriptor);
  return sum;
}

/** Rows by digest, some at a time, through the driver's own rows. */
async function sumModels({ collaborationId, digests }: Stored): Promise<Float64Array> {
  const sum = new Float64Array(SIZE);
  for (let first = 0; first < digests.length; first += READ_AT_ONCE) {
    const digest = digests.slice(first, first + READ_AT_ONCE);
    const rows = await CompletenessMapRow.findAll({ where: { collaborationId, digest } });
    for (const { nodeValues } of rows) add(sum, nodeValues);
  }
  return sum;
}

/** As a run reads its maps, each with its axes and in the order of its stars. */
async function sumStream({ collaborationId, digests }: Stored): Promise<Float64Array> {
  const sum = new Float64Array(SIZE);
  await streamMaps(collaborationId, { by: 'digest', keys: digests }, ({ encoded }) => {
    for (let i = 0; i < SIZE; i++) sum[i] += encoded[i];
  });
  return sum;
}

async function linesOf(stars: number, stored: Stored, rounds: number) {
  const expected = sumFile(stored);
  const ways = [
    ['plain rows', () => sumModels(stored), []],
    ['as a run reads', () => sumStream(stored), TARGETS],
  ] as const;
  const lines: Line[] = [];
  for (const [way, read, targets] of ways) {
    const sum = await read();
    const max = sum.reduce((most, value, i) => Math.max(most, Math.abs(value - expected[i])), 0);
    const compared = await compareTimed(
      () => wallMilliseconds(async () => (await read())[0]),
      () => wallMilliseconds(() => sumFile(stored)[0]),
      rounds,
    );
    const { median, min, max: most } = compared.ratio;
    lines.push({
      name: `storage, read and sum, ${way}`,
      stars,
      rounds,
      medianMs: compared.medianMs,
      // Here the product is the slower one: how many times the yardstick's time it takes.
      ratio: { median: 1 / median, min: 1 / most, max: 1 / min },
      unit: 'times',
      yardstick: `file in the page cache and sum, ${compared.yardstickMs.toPrecision(2)} ms`,
      errors: { max },
      targets: [...targets],
    });
  }
  return lines;
}

/** Reading all maps of a survey through PostgreSQL and summing them, against a plain file. */
export async function storageLines({ rounds, storedMaps }: Amount): Promise<Line[]> {
  const made = await createTestDatabase();
  process.env.DATABASE_URL = made.url;
  const folder = mkdtempSync(path.join(tmpdir(), 'bench-storage-'));
  try {
    database();
    const lines: Line[] = [];
    for (const stars of storedMaps) {
      const stored = await storeSurvey(stars, folder);
      lines.push(...(await linesOf(stars, stored, rounds)));
    }
    return lines;
  } finally {
    rmSync(folder, { recursive: true, force: true });
    await dropTestDatabase(made);
  }
}
