import { isInOneTransaction } from '@/models';

interface Lane {
  running: Promise<unknown>;
  /** For those who asked after the running one had begun. */
  next: Promise<unknown> | null;
}

const lanes = new Map<string, Lane>();

function run<T>(key: string, work: () => Promise<T>): Promise<T> {
  const answer = work();
  const lane: Lane = { running: answer, next: null };
  lanes.set(key, lane);
  const end = () => {
    if (lane.next === null) lanes.delete(key);
  };
  answer.then(end, end);
  return answer;
}

/**
 * What several people ask for at one moment is read once for all of them: a class that opens the same
 * page, the windows of one person. Nothing is kept: whoever asks while it is being read waits for the
 * next reading, so that each answer was read after it was asked for, and no write is missed.
 *
 * Within the transaction of a whole request it reads for that request alone.
 *
 * @param key names what is read, with the collaboration whose it is
 * @param work must depend on nothing but the key, not on who asks; its answer is not to be changed
 */
export function together<T>(key: string, work: () => Promise<T>): Promise<T> {
  if (isInOneTransaction()) return work();
  const lane = lanes.get(key);
  if (!lane) return run(key, work);
  const next = () => run(key, work);
  lane.next ??= lane.running.then(next, next);
  return lane.next as Promise<T>;
}
