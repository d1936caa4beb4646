import { pageAddresses, thingPages } from '../load-addresses';
import {
  CONNECTIONS,
  fireAt,
  measureHealth,
  most,
  secondsEach,
  slowest,
  wordsOf,
  wrongAnswers,
} from '../load-volleys';
import type { Bench, Measured, Row } from '../row';
import { signedIn, signInOf } from '../visitor';

const PER_SECOND = 20;
const P99_MS = 1000;

async function measure(bench: Bench): Promise<Measured> {
  const running = await bench.product();
  const cookie = await signedIn(running, signInOf(running, 'owner'));
  const health = await measureHealth(bench, running);
  const routes = [...pageAddresses(bench.root), ...(await thingPages(running, cookie))];
  const shots = await fireAt(bench, running, cookie, routes);
  const missed = shots.filter(
    (shot) => shot.perSecond < PER_SECOND || shot.p99Ms >= P99_MS || wrongAnswers([shot]) > 0,
  );
  const worst = slowest(shots);
  return {
    isMet: missed.length === 0,
    figure:
      `${shots.length} pages, ${CONNECTIONS} connections, ${secondsEach()} s each: health ` +
      `${health.toFixed(0)}/s; slowest ${worst.route} ${worst.perSecond.toFixed(0)}/s, ` +
      `${(health / worst.perSecond).toFixed(1)} × health; 99 % within ` +
      `${most(shots, ({ p99Ms }) => p99Ms)} ms; ${wrongAnswers(shots)} wrong; ` +
      `${missed.length} pages missed`,
    details: { health, connections: CONNECTIONS, seconds: secondsEach(), shots },
    notes: missed.map((shot) => `${shot.route}: ${wordsOf(shot)}`),
  };
}

export const row: Row = {
  name: 'load-pages',
  what: 'L1: every page of the laboratory under 50 connections',
  goal: `no wrong answer, ≥ ${PER_SECOND}/s, 99 % under ${P99_MS} ms, each`,
  isFirst: true,
  measure,
};
