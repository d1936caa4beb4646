import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { isAlive, waitUntil } from '@/lib/local/process-run.mjs';
import { restartPauseMs, Supervisor } from '@/lib/local/supervisor.mjs';

const folder = mkdtempSync(path.join(os.tmpdir(), 'supervisor-'));
afterAll(() => rmSync(folder, { recursive: true }));

interface Process {
  name: string;
  pid: number;
}

function observe() {
  const lines: string[] = [];
  const seen: { processes: Process[] } = { processes: [] };
  const supervisor = new Supervisor({
    logsFolder: folder,
    say: (line: string) => lines.push(line),
    onChange: (processes: Process[]) => {
      seen.processes = processes;
    },
  });
  return { supervisor, lines, seen };
}

const service = (name: string, script: string, more = {}) => ({
  name,
  command: process.execPath,
  args: ['-e', `${script}; console.log('up')`],
  isReady: () => readFileSync(path.join(folder, `${name}.log`), 'utf8').includes('up'),
  ...more,
});

const stayAlive = 'setInterval(() => {}, 1000)';

describe('Supervisor', () => {
  it('restarts what ends by itself and shows the end of its log', async () => {
    const { supervisor, lines, seen } = observe();
    await supervisor.start(service('restless', `console.log('ink is out'); ${stayAlive}`));
    const [first] = seen.processes;
    process.kill(first.pid, 'SIGKILL');
    expect(await waitUntil(() => seen.processes[0].pid !== first.pid, 5000)).toBe(true);
    expect(lines.join('\n')).toContain('restless ended unexpectedly (signal SIGKILL)');
    expect(lines.join('\n')).toContain('ink is out');
    const { pid } = seen.processes[0];
    await supervisor.stop();
    expect(isAlive(pid, undefined)).toBe(false);
  });

  it('stops in reverse order and kills what does not listen', async () => {
    const { supervisor, seen } = observe();
    const order = path.join(folder, 'order');
    const noting = (name: string) =>
      `process.on('SIGTERM', () => { require('fs').appendFileSync(${JSON.stringify(order)}, '${name} '); process.exit(); }); ${stayAlive}`;
    await supervisor.start(service('first', noting('first')));
    await supervisor.start(
      service('deaf', `process.on('SIGTERM', () => {}); ${stayAlive}`, { stopMs: 200 }),
    );
    await supervisor.start(service('last', noting('last')));
    const started = seen.processes;
    await supervisor.stop();
    expect(readFileSync(order, 'utf8')).toBe('last first ');
    expect(started.map(({ pid }) => isAlive(pid, undefined))).toEqual([false, false, false]);
    expect(seen.processes).toEqual([]);
  });

  it('says why a service did not start', async () => {
    const { supervisor } = observe();
    const broken = service('broken', "console.error('no such table'); process.exit(3)");
    await expect(supervisor.start(broken)).rejects.toThrow(
      /broken did not start \(exit code 3\).*no such table/s,
    );
  });

  it('pauses longer after each failure, up to half a minute', () => {
    expect([1, 2, 3, 6, 50].map(restartPauseMs)).toEqual([1000, 2000, 4000, 30_000, 30_000]);
  });

  it('leaves nothing behind when it is killed itself', async () => {
    const pidFile = path.join(folder, 'child-pid');
    const script = `
      import { Supervisor } from ${JSON.stringify(path.resolve('lib/local/supervisor.mjs'))};
      import { writeFileSync } from 'node:fs';
      const supervisor = new Supervisor({ logsFolder: ${JSON.stringify(folder)}, say: () => {},
        onChange: ([child]) => writeFileSync(${JSON.stringify(pidFile)}, String(child.pid)) });
      await supervisor.start({ name: 'orphan', command: process.execPath,
        args: ['-e', ${JSON.stringify(stayAlive)}], isReady: (upMs) => upMs > 300 });
      process.stdout.write('up');`;
    const launcher = spawn(process.execPath, ['--input-type=module', '-e', script]);
    await new Promise((resolve) => launcher.stdout.once('data', resolve));
    const pid = Number(readFileSync(pidFile, 'utf8'));
    expect(isAlive(pid, undefined)).toBe(true);
    launcher.kill('SIGKILL');
    expect(await waitUntil(() => !isAlive(pid, undefined), 3000)).toBe(true);
    expect(existsSync(path.join(folder, 'orphan.log'))).toBe(true);
  });
});
