import { mkdirSync, mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import net, { type AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { holdExclusively, withExclusive } from '@/lib/local/exclusive.mjs';
import { fingerprint } from '@/lib/local/fingerprint.mjs';
import { findFreePort, isPortFree, wantedPort } from '@/lib/local/ports.mjs';
import { isAlive, readProcess, run } from '@/lib/local/process-run.mjs';
import { readSecrets } from '@/lib/local/secrets.mjs';

const folder = mkdtempSync(path.join(os.tmpdir(), 'launcher-'));
afterAll(() => rmSync(folder, { recursive: true }));

async function occupyPort(host: string): Promise<{ port: number; close: () => Promise<void> }> {
  const server = net.createServer();
  await new Promise<void>((resolve) => server.listen(0, host, resolve));
  const { port } = server.address() as AddressInfo;
  return { port, close: () => new Promise((resolve) => server.close(() => resolve())) };
}

describe('findFreePort(wanted)', () => {
  it.each(['127.0.0.1', '0.0.0.0', '::'])(
    'passes over a port that is taken on %s',
    async (host) => {
      const taken = await occupyPort(host);
      expect(await isPortFree(taken.port)).toBe(false);
      expect(await findFreePort(taken.port)).toBeGreaterThan(taken.port);
      await taken.close();
      expect(await findFreePort(taken.port)).toBe(taken.port);
    },
  );

  it('passes over ports that were given away already', async () => {
    const { port, close } = await occupyPort('127.0.0.1');
    await close();
    expect(await findFreePort(port, [port])).toBeGreaterThan(port);
  });
});

describe('wantedPort(text)', () => {
  it('is 3210 unless a number is named', () => {
    expect([wantedPort(undefined), wantedPort(''), wantedPort('8080')]).toEqual([3210, 3210, 8080]);
  });

  it.each(['0', '65536', '80.5', 'web'])('refuses %s', (text) => {
    expect(() => wantedPort(text)).toThrow(`got "${text}"`);
  });
});

describe('fingerprint(places)', () => {
  const base = path.join(folder, 'sources');
  const digest = () => fingerprint(['app', 'lib', 'proxy.ts'], { base, leaveOut: ['lib/local'] });
  const write = (file: string, text: string) => {
    mkdirSync(path.dirname(path.join(base, file)), { recursive: true });
    writeFileSync(path.join(base, file), text);
  };

  it('changes with a content, a name and a new file, and not with what is left out', () => {
    write('app/page.tsx', 'one');
    const first = digest();
    expect(digest()).toBe(first);
    write('lib/local/start.mjs', 'left out');
    write('app/.hidden', 'left out');
    expect(digest()).toBe(first);
    write('app/page.tsx', 'two');
    const second = digest();
    write('proxy.ts', '');
    const third = digest();
    expect(new Set([first, second, third]).size).toBe(3);
    rmSync(path.join(base, 'proxy.ts'));
    expect(digest()).toBe(second);
  });
});

describe('holdExclusively(name)', () => {
  it('tells the second who is first, and lets the next one in afterwards', async () => {
    const name = `test-${process.pid}`;
    const first = await holdExclusively(name, () => 'http://127.0.0.1:3210');
    expect(await holdExclusively(name)).toEqual({ heldBy: 'http://127.0.0.1:3210' });
    if (!('release' in first)) throw new Error('the first one was not let in');
    await first.release();
    expect(await holdExclusively(name)).toHaveProperty('release');
  });

  it('is free again when its holder is killed', async () => {
    const name = `killed-${process.pid}`;
    const module = path.resolve('lib/local/exclusive.mjs');
    const script = `import { holdExclusively } from ${JSON.stringify(module)};
      await holdExclusively(${JSON.stringify(name)}); process.kill(process.pid, 'SIGKILL');`;
    await run(process.execPath, ['--input-type=module', '-e', script]);
    expect(await holdExclusively(name)).toHaveProperty('release');
  });

  it('withExclusive lets one in at a time', async () => {
    const events: string[] = [];
    const work = (name: string) =>
      withExclusive(`turns-${process.pid}`, async () => {
        events.push(`${name} in`);
        await new Promise((resolve) => setTimeout(resolve, 20));
        events.push(`${name} out`);
      });
    await Promise.all([work('a'), work('b')]);
    expect(events).toEqual(['a in', 'a out', 'b in', 'b out']);
  });
});

describe('isAlive(pid, startTicks)', () => {
  it('knows this process, and not a later one with the same number', () => {
    const { startTicks } = readProcess(process.pid) ?? { startTicks: '' };
    expect(isAlive(process.pid, startTicks)).toBe(true);
    expect(isAlive(process.pid, `${startTicks}1`)).toBe(false);
  });
});

describe('readSecrets(folder)', () => {
  it('makes a secret once and keeps it for the owner alone', () => {
    const first = readSecrets(folder);
    expect(first.NEXTAUTH_SECRET.length).toBeGreaterThanOrEqual(43);
    expect(readSecrets(folder)).toEqual(first);
    expect(statSync(path.join(folder, 'secrets.json')).mode & 0o777).toBe(0o600);
  });
});
