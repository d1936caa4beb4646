import { setTimeout as pause } from 'node:timers/promises';
import { listAddresses, pageAddresses, thingPages } from '../load-addresses';
import { residentOf } from '../memory';
import type { Bench, Measured, Row } from '../row';
import { signedIn, signInOf } from '../visitor';

const PER_SECOND = 20;
const SETTLED_S = 120;
const WINDOW_S = 60;
const GROWTH_MB = 30;
const SAMPLE_MS = 2000;
/** As many requests may be under way; more than a second's worth would be a server that lags. */
const MOST_OPEN = 40;
const minutes = () => Number(process.env.HARDEN_MEMORY_MIN ?? 10);

interface Sample {
  atS: number;
  mb: number;
}

const medianOf = (samples: readonly Sample[]): number => {
  const sorted = samples.map(({ mb }) => mb).sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)];
};

/** Median resident memory in a minute of the run [MB]. */
const within = (samples: readonly Sample[], fromS: number) =>
  medianOf(samples.filter(({ atS }) => atS >= fromS && atS < fromS + WINDOW_S));

async function measure({ root, product, say }: Bench): Promise<Measured> {
  const running = await product();
  const cookie = await signedIn(running, signInOf(running, 'owner'));
  const routes = [
    ...listAddresses(),
    ...pageAddresses(root),
    ...(await thingPages(running, cookie)),
  ];
  const lastS = 60 * minutes();
  const samples: Sample[] = [];
  const start = performance.now();
  const nowS = () => (performance.now() - start) / 1000;
  const sampler = setInterval(() => {
    samples.push({ atS: nowS(), mb: residentOf(running.pidOf('web')) });
  }, SAMPLE_MS);
  let sent = 0;
  let wrong = 0;
  let late = 0;
  const open = new Set<Promise<void>>();
  const ask = async (route: string) => {
    try {
      const answer = await fetch(running.address + route, { headers: { cookie } });
      await answer.arrayBuffer();
      if (answer.status !== 200) wrong++;
    } catch {
      wrong++;
    }
  };
  try {
    while (nowS() < lastS) {
      await pause(Math.max(0, 1000 * (sent / PER_SECOND - nowS())));
      if (open.size >= MOST_OPEN) {
        late++;
        await Promise.race(open);
      }
      const request = ask(routes[sent++ % routes.length]);
      open.add(request);
      void request.then(() => open.delete(request));
      if (sent % (PER_SECOND * 60) === 0) {
        say(`${Math.round(nowS() / 60)} min: ${Math.round(samples.at(-1)?.mb ?? 0)} MB`);
      }
    }
    await Promise.all(open);
  } finally {
    clearInterval(sampler);
  }
  const settledMb = within(samples, SETTLED_S);
  const lastMb = within(samples, lastS - WINDOW_S);
  const growthMb = lastMb - settledMb;
  const perSecond = sent / nowS();
  const byMinute = Array.from({ length: Math.floor(minutes()) }, (_, i) =>
    Math.round(within(samples, i * WINDOW_S)),
  );
  return {
    isMet: growthMb < GROWTH_MB && wrong === 0 && perSecond > 0.95 * PER_SECOND,
    figure:
      `${sent} requests of ${routes.length} addresses at ${perSecond.toFixed(1)}/s, ${wrong} wrong: ` +
      `median ${settledMb.toFixed(0)} MB in minute 3, ${lastMb.toFixed(0)} MB in the last, ` +
      `growth ${growthMb.toFixed(0)} MB`,
    details: { sent, wrong, late, perSecond, settledMb, lastMb, growthMb, byMinute },
    notes: [`by minute: ${byMinute.join(', ')} MB`],
  };
}

export const row: Row = {
  name: 'load-memory',
  what: 'L6: ten minutes of lists and pages at 20 requests a second',
  goal: `no wrong answer; resident memory of the web server grows < ${GROWTH_MB} MB after minute 2`,
  isFirst: true,
  measure,
};
