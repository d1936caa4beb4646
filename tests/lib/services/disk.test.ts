import { mkdtempSync, readdirSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { problemOf } from '@/app/api/v1/problem';
import { noRoomFor, sweepFolder } from '@/lib/services/disk';

const HOUR_S = 3600;
let folder: string;

beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'incoming-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

/** As the driver wraps what the server says. */
const ofDatabase = (name: string, code: string, message = 'could not') =>
  Object.assign(new Error(message), {
    name,
    original: Object.assign(new Error(message), { code }),
  });

async function answerTo(error: unknown) {
  const response = problemOf(error, 'request-1');
  const { code, detail } = (await response.json()) as { code: string; detail: string };
  return { status: response.status, code, detail, wait: response.headers.get('retry-after') };
}

describe('what a full disk is answered with', () => {
  it('is 507 for a file, with a sentence that says so', async () => {
    for (const code of ['ENOSPC', 'EDQUOT', 'EFBIG']) {
      const refusal = noRoomFor(Object.assign(new Error('write'), { code }));
      expect(await answerTo(refusal)).toMatchObject({ status: 507, code: 'disk-full', wait: null });
    }
    expect(noRoomFor(Object.assign(new Error('write'), { code: 'EIO' }))).toBeNull();
    expect(noRoomFor(null)).toBeNull();
  });

  it('is 503 for the database, and nothing of the database’s own words', async () => {
    const error = ofDatabase('SequelizeDatabaseError', '53100', 'could not extend file "base/1"');
    const { detail, ...answer } = await answerTo(error);
    expect(answer).toEqual({ status: 503, code: 'disk-full', wait: '5' });
    expect(detail).toMatch(/disk of the database is full; nothing was stored/);
    expect(detail).not.toMatch(/extend|base\//);
  });
});

describe('a database that goes away', () => {
  it.each([
    ['ended by an administrator', ofDatabase('SequelizeDatabaseError', '57P01')],
    ['crashed', ofDatabase('SequelizeDatabaseError', '57P02')],
    ['starting', Object.assign(new Error('starting up'), { code: '57P03' })],
    ['a broken connection', new Error('Connection terminated unexpectedly')],
    ['too many connections', ofDatabase('SequelizeDatabaseError', '53300')],
  ])('%s: 503, and whether it took effect is not claimed', async (_, error) => {
    const answer = await answerTo(error);
    expect(answer).toMatchObject({ status: 503, code: 'unavailable', wait: '5' });
    expect(answer.detail).not.toMatch(/nothing was stored/);
  });

  it('that cannot be reached stored nothing', async () => {
    const error = Object.assign(new Error(), { name: 'SequelizeConnectionRefusedError' });
    expect((await answerTo(error)).detail).toMatch(/nothing was stored/);
  });

  it('is told from a fault of ours', async () => {
    for (const code of ['42601', '23514', '40001']) {
      expect(await answerTo(ofDatabase('SequelizeDatabaseError', code))).toMatchObject({
        status: 500,
        code: 'unknown',
      });
    }
  });
});

describe('files of uploads that were cut off', () => {
  it('go an hour after their last byte', async () => {
    const now = Date.now() / 1000;
    for (const [name, ageS] of [
      ['abandoned', 1.1 * HOUR_S],
      ['coming', 0.9 * HOUR_S],
    ] as const) {
      writeFileSync(path.join(folder, name), 'bytes');
      utimesSync(path.join(folder, name), now - ageS, now - ageS);
    }
    await sweepFolder(folder, HOUR_S * 1000);
    expect(readdirSync(folder)).toEqual(['coming']);
  });
});
