import { spawn } from 'node:child_process';
import path from 'node:path';
import { z } from 'zod';

/** Seconds beside the shots themselves after which a run of autocannon has hung. */
const SPARE_S = 60;

const resultSchema = z.object({
  duration: z.number(),
  errors: z.number(),
  timeouts: z.number(),
  non2xx: z.number(),
  '2xx': z.number(),
  requests: z.object({ average: z.number(), total: z.number() }),
  latency: z.object({ p50: z.number(), p97_5: z.number(), p99: z.number(), max: z.number() }),
});

export interface Shots {
  address: string;
  cookie?: string;
  connections: number;
  seconds: number;
  /** Requests per second of all connections together; as many as go where it is left out. */
  rate?: number;
}

/** What one address answered under load. */
export interface Volley {
  /** Right answers per second. */
  perSecond: number;
  answers: number;
  non2xx: number;
  /** Sockets that broke or answered nothing for 10 s. */
  socketErrors: number;
  p50Ms: number;
  p97Ms: number;
  p99Ms: number;
}

/** Asks one address over and over, from a process of its own: its work must not slow the counting. */
export async function fire(root: string, shots: Shots): Promise<Volley> {
  const { address, cookie, connections, seconds, rate } = shots;
  const words = ['-j', '-n', '-c', String(connections), '-d', String(seconds), '-t', '10'];
  if (rate !== undefined) words.push('-R', String(rate));
  if (cookie !== undefined) words.push('-H', `cookie=${cookie}`);
  const program = path.join(root, 'node_modules/autocannon/autocannon.js');
  const child = spawn(process.execPath, [program, ...words, address], {
    stdio: ['ignore', 'pipe', 'pipe'],
    timeout: 1000 * (seconds + SPARE_S),
  });
  let output = '';
  let complaints = '';
  child.stdout.on('data', (part) => (output += part));
  child.stderr.on('data', (part) => (complaints += part));
  const code = await new Promise((resolve) => child.once('close', resolve));
  if (code !== 0) throw new Error(`autocannon ended with ${code}: ${complaints.slice(0, 500)}`);
  const found = resultSchema.parse(JSON.parse(output));
  return {
    perSecond: found['2xx'] / found.duration,
    answers: found['2xx'],
    non2xx: found.non2xx,
    // autocannon counts a timeout as an error too.
    socketErrors: found.errors,
    p50Ms: found.latency.p50,
    p97Ms: found.latency.p97_5,
    p99Ms: found.latency.p99,
  };
}
