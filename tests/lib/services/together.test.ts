import { describe, expect, it } from 'vitest';
import { together } from '@/lib/services/together';

/** Readings that end when they are told to. */
function readings() {
  const begun: { end(answer: string): void; fail(error: Error): void }[] = [];
  const read = () =>
    new Promise<string>((resolve, reject) => begun.push({ end: resolve, fail: reject }));
  return { begun, read };
}
const settle = () => new Promise((next) => setTimeout(next, 0));

describe('what several ask for at one moment', () => {
  it('is read once for all who ask while another reading runs, after each has asked', async () => {
    const { begun, read } = readings();
    const first = together('a', read);
    const later = [together('a', read), together('a', read), together('a', read)];
    await settle();
    expect(begun).toHaveLength(1);
    begun[0].end('before');
    expect(await first).toBe('before');
    await settle();
    expect(begun).toHaveLength(2);
    begun[1].end('after');
    expect(await Promise.all(later)).toEqual(['after', 'after', 'after']);
    const alone = together('a', read);
    expect(begun).toHaveLength(3);
    begun[2].end('anew');
    expect(await alone).toBe('anew');
  });

  it('keeps different things apart', async () => {
    const { begun, read } = readings();
    const answers = [together('a', read), together('b', read)];
    expect(begun).toHaveLength(2);
    begun[0].end('of a');
    begun[1].end('of b');
    expect(await Promise.all(answers)).toEqual(['of a', 'of b']);
  });

  it('fails those who shared a reading, and nobody after them', async () => {
    const { begun, read } = readings();
    const first = together('a', read);
    const second = together('a', read);
    begun[0].fail(new Error('lost'));
    await expect(first).rejects.toThrow('lost');
    await settle();
    begun[1].end('there again');
    expect(await second).toBe('there again');
  });
});
