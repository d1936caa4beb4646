import { spawn } from 'node:child_process';
import path from 'node:path';

/** Where the run's bundles hold the process that computes maps and nothing else. */
export const ENGINE_PROCESS = 'tests/harden/engine-process';

function engine(script: string, maps: number): Promise<void> {
  const child = spawn(process.execPath, [script, String(maps)], {
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  return new Promise((resolve, reject) => {
    child.once('exit', (code) =>
      code === 0 ? resolve() : reject(new Error(`the engine ended with ${code}`)),
    );
  });
}

/** Maps a second that so many processes of the bare engine make together, now, on this machine. */
export async function engineRate(folder: string, processes: number, maps: number): Promise<number> {
  const script = path.join(folder, `${ENGINE_PROCESS}.js`);
  const start = performance.now();
  await Promise.all(Array.from({ length: processes }, () => engine(script, maps)));
  return (1000 * processes * maps) / (performance.now() - start);
}
