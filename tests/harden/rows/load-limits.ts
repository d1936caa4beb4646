import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import type { LimitName } from '@/lib/access/attempts';
import { Api } from '../api';
import { addMember } from '../laboratory-rows';
import { limitCases } from '../limit-cases';
import { type Trial, tryLimit } from '../limit-trial';
import { LAB } from '../load-addresses';
import type { Bench, Measured, Row, RunningProduct } from '../row';

const LANES = 5;
const RUNS = 60;

/** Handlers that name a limit, and cases that name a handler: the two must be the same. */
function findUncovered(root: string): string[] {
  const folder = path.join(root, 'app/api');
  const covered = new Set(
    Object.entries(limitCases).flatMap(([limit, { routes }]) =>
      Object.keys(routes).map((file) => `${file} ${limit}`),
    ),
  );
  const found = readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((file) => path.basename(file) === 'route.ts')
    .flatMap((file) => {
      const text = readFileSync(path.join(folder, file), 'utf8');
      return [...text.matchAll(/\blimit: '([a-z-]+)'/g)].map(([, limit]) => `${file} ${limit}`);
    });
  const missing = found.filter((one) => !covered.has(one)).map((one) => `no case: ${one}`);
  const gone = [...covered].filter((one) => !found.includes(one)).map((one) => `gone: ${one}`);
  return [...missing, ...gone];
}

/** One person's runs fill their share of the queue; somebody else's does not wait for that. */
async function tryQueue(product: RunningProduct): Promise<string[]> {
  const { analyses } = await new Api(product).read<{ analyses: { key: string }[] }>('analyses');
  const address = `${product.address}/api/v1/collaborations/${LAB}/analyses/${analyses[0].key}/runs`;
  const ask = async (token: string) => {
    const answer = await fetch(address, {
      method: 'POST',
      headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json' },
    });
    await answer.arrayBuffer();
    return { status: answer.status, retryAfterS: Number(answer.headers.get('retry-after')) };
  };
  const [one, other] = [
    await addMember(product, LAB, ['statistician']),
    await addMember(product, LAB, ['statistician']),
  ];
  const answers = await Promise.all(Array.from({ length: RUNS }, () => ask(one.token)));
  const refused = answers.filter(({ status }) => status === 429);
  const faults: string[] = [];
  if (refused.length === 0) faults.push(`queue: none of ${RUNS} runs asked at once was refused`);
  if (refused.some(({ retryAfterS }) => !(retryAfterS >= 1))) faults.push('queue: no Retry-After');
  const { status } = await ask(other.token);
  if (status !== 201) faults.push(`queue: somebody else's run was answered ${status}`);
  return faults;
}

async function measure({ product, root, say }: Bench): Promise<Measured> {
  const running = await product();
  const faults = [...findUncovered(root), ...(await tryQueue(running))];
  const trials: Trial[] = [];
  const waiting = Object.keys(limitCases) as LimitName[];
  const lane = async () => {
    for (let limit = waiting.shift(); limit; limit = waiting.shift()) {
      const trial = await tryLimit(running, limit);
      trials.push(trial);
      say(`${limit}: ${trial.taken} of ${trial.points}, Retry-After ${trial.retryAfterS} s`);
    }
  };
  await Promise.all(Array.from({ length: LANES }, lane));
  faults.push(...trials.flatMap((trial) => trial.faults));
  const slow = trials.filter(({ isTooSlow }) => isTooSlow).map(({ limit }) => limit);
  const right = trials.filter((trial) => trial.faults.length === 0).length;
  const routes = Object.values(limitCases).reduce(
    (sum, one) => sum + Math.max(1, Object.keys(one.routes).length),
    0,
  );
  return {
    isMet: faults.length === 0 && slow.length === 0,
    figure:
      `${right} of ${trials.length} limits (${routes} ways in) refused after their count and let in ` +
      `again when Retry-After said; ${faults.length} faults, the queue's among them`,
    details: { trials, routes },
    notes: [
      ...faults,
      ...slow.map((limit) => `${limit}: answered too slowly to be tried before its end`),
    ],
  };
}

export const row: Row = {
  name: 'load-limits',
  what: 'L7: every limit used up, to its end',
  goal: '429 after the stated count; Retry-After right within 1 s; nobody else is refused',
  measure,
};
