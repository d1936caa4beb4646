import { fire, type Volley } from './load-cannon';
import type { Bench, RunningProduct } from './row';

export const CONNECTIONS = 50;
export const secondsEach = () => Number(process.env.HARDEN_LOAD_SECONDS ?? 3);

export interface Shot extends Volley {
  route: string;
}

/**
 * A few answers before the counting starts, so that the code is loaded.
 *
 * @returns whether it is an address that answers by itself; false where it leads to another one
 */
async function warmUp(address: string, cookie: string): Promise<boolean> {
  for (let i = 0; i < 3; i++) {
    const answer = await fetch(address, { headers: { cookie }, redirect: 'manual' });
    await answer.arrayBuffer();
    if (answer.status >= 300 && answer.status < 400) return false;
    if (answer.status !== 200) throw new Error(`${address} answers ${answer.status}`);
  }
  return true;
}

/** Fires at one address after the other, and says what each answered. */
export async function fireAt(
  { root, say }: Pick<Bench, 'root' | 'say'>,
  product: RunningProduct,
  cookie: string,
  routes: readonly string[],
  rate?: number,
): Promise<Shot[]> {
  const shots: Shot[] = [];
  for (const route of routes) {
    const address = product.address + route;
    if (!(await warmUp(address, cookie))) {
      say(`${route} leads elsewhere`);
      continue;
    }
    const volley = await fire(root, {
      address,
      cookie,
      connections: CONNECTIONS,
      seconds: secondsEach(),
      ...(rate === undefined ? {} : { rate }),
    });
    shots.push({ route, ...volley });
    say(`${route}: ${wordsOf(volley)}`);
  }
  return shots;
}

export function wordsOf({ perSecond, p50Ms, p97Ms, p99Ms, non2xx, socketErrors }: Volley): string {
  const wrong = non2xx + socketErrors;
  return (
    `${perSecond.toFixed(0)}/s, median ${p50Ms} ms, 97.5 % ${p97Ms} ms, 99 % ${p99Ms} ms` +
    (wrong > 0 ? `, ${non2xx} refused, ${socketErrors} broken` : '')
  );
}

/** Answers per second of the health address: what results are stated in ratios of. */
export async function measureHealth(
  bench: Pick<Bench, 'root' | 'say'>,
  product: RunningProduct,
): Promise<number> {
  const [{ perSecond }] = await fireAt(bench, product, '', ['/api/health']);
  return perSecond;
}

export const slowest = (shots: readonly Shot[]): Shot =>
  shots.reduce((worst, shot) => (shot.perSecond < worst.perSecond ? shot : worst));

export const most = (shots: readonly Shot[], of: (shot: Shot) => number): number =>
  Math.max(...shots.map(of));

export const wrongAnswers = (shots: readonly Shot[]): number =>
  shots.reduce((sum, { non2xx, socketErrors }) => sum + non2xx + socketErrors, 0);
