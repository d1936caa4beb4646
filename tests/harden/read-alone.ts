import { spawn } from 'node:child_process';
import path from 'node:path';
import { performance } from 'node:perf_hooks';
import type { UploadKind } from '@/lib/formats';
import { watchMemory } from './memory';

/** Reads what comes on its standard input on a thread, as the web process does, and says how it went. */
const program = `
const { Worker } = require('node:worker_threads');
const parts = [];
process.stdin.on('data', (part) => parts.push(part));
process.stdin.on('end', () => {
  const bytes = new Uint8Array(Buffer.concat(parts));
  parts.length = 0;
  const [, bundle, kind] = process.argv;
  const code = 'const { parentPort } = require("node:worker_threads"); const read = require(' +
    JSON.stringify(bundle) + ').default; parentPort.on("message", async (task) => ' +
    'parentPort.postMessage((await read(task)).ok));';
  const worker = new Worker(code, { eval: true, resourceLimits: { maxOldGenerationSizeMb: 1024 } });
  worker.on('message', (ok) => { process.stdout.write(String(ok)); process.exit(0); });
  worker.on('error', (error) => { process.stdout.write(String(error)); process.exit(1); });
  worker.postMessage({ bytes, context: { fileName: 'file', kind } }, [bytes.buffer]);
});
`;

/** Time and memory of the thread that reads a file, in a process that does nothing else. */
export async function readAlone(
  root: string,
  kind: UploadKind,
  bytes: Uint8Array,
): Promise<{ seconds: number; mostMb: number; said: string }> {
  const bundle = path.join(root, 'dist/harden/workers/compute/read-upload.js');
  const child = spawn(process.execPath, ['-e', program, bundle, kind], {
    stdio: ['pipe', 'pipe', 'inherit'],
    detached: true,
  });
  if (child.pid === undefined) throw new Error('the reader did not start');
  const watch = watchMemory(child.pid);
  const start = performance.now();
  let said = '';
  child.stdout.on('data', (part) => {
    said += part;
  });
  child.stdin.end(bytes);
  await new Promise((resolve) => child.once('close', resolve));
  const seconds = Number(((performance.now() - start) / 1000).toFixed(2));
  return { seconds, mostMb: watch.stop(), said };
}
