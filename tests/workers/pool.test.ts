import path from 'node:path';
import { afterEach, expect, it } from 'vitest';
import { type ComputePool, openPool, ThreadFault } from '@/workers/pool';

const folder = path.resolve(import.meta.dirname, '../fixtures/threads');
const never = new AbortController().signal;
let pool: ComputePool;

afterEach(() => pool.close());

const open = ({ taskLimitS = 60 } = {}) => {
  pool = openPool({ folder, threads: 1, taskLimitS, memoryMb: 64 });
  return pool;
};
const goesOn = async () => expect(await pool.run('double', 21, { signal: never })).toBe(42);

it('a thread that throws gives its sentence, and the pool goes on', async () => {
  const failing = open().run('throws', null, { signal: never });
  await expect(failing).rejects.toThrow(new ThreadFault('the ranges do not fit'));
  await goesOn();
});

it('a thread that runs out of memory fails alone', async () => {
  const failing = open().run('hungry', null, { signal: never });
  await expect(failing).rejects.toThrow('needed more than 64 MB of memory');
  await goesOn();
});

it('a thread that never ends is ended at the limit', async () => {
  const failing = open({ taskLimitS: 2 }).run('endless', null, { signal: never });
  await expect(failing).rejects.toThrow('took longer than 2 s');
  await goesOn();
});

it('an abort ends a busy thread at once, with its reason', async () => {
  const stop = new AbortController();
  const failing = open().run('endless', null, { signal: stop.signal });
  setTimeout(() => stop.abort(new Error('cancelled')), 200);
  await expect(failing).rejects.toThrow('cancelled');
  await goesOn();
});
