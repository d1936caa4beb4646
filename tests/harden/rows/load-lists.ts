import { listAddresses } from '../load-addresses';
import {
  CONNECTIONS,
  fireAt,
  measureHealth,
  most,
  type Shot,
  secondsEach,
  slowest,
  wordsOf,
  wrongAnswers,
} from '../load-volleys';
import type { Bench, Measured, Row } from '../row';
import { signedIn, signInOf } from '../visitor';

const PER_SECOND = 100;
const P99_MS = 1000;
const COST = 4;

async function measure(bench: Bench): Promise<Measured> {
  const running = await bench.product();
  const cookie = await signedIn(running, signInOf(running, 'owner'));
  const before = await measureHealth(bench, running);
  const shots = await fireAt(bench, running, cookie, listAddresses());
  const after = await measureHealth(bench, running);
  // The machine may be busier at one end than at the other.
  const health = Math.min(before, after);
  const costOf = ({ perSecond }: Shot) => health / perSecond;
  const missed = shots.filter(
    (shot) =>
      shot.perSecond < PER_SECOND ||
      shot.p99Ms >= P99_MS ||
      costOf(shot) > COST ||
      wrongAnswers([shot]) > 0,
  );
  const worst = slowest(shots);
  return {
    isMet: missed.length === 0,
    figure:
      `${shots.length} lists, ${CONNECTIONS} connections, ${secondsEach()} s each: health ` +
      `${before.toFixed(0)} then ${after.toFixed(0)}/s; slowest ${worst.route} ` +
      `${worst.perSecond.toFixed(0)}/s, ${costOf(worst).toFixed(1)} × health; 99 % within ` +
      `${most(shots, ({ p99Ms }) => p99Ms)} ms; ${wrongAnswers(shots)} wrong; ` +
      `${missed.length} lists missed`,
    details: { health: { before, after }, connections: CONNECTIONS, seconds: secondsEach(), shots },
    notes: missed.map((shot) => `${shot.route}: ${wordsOf(shot)}, ${costOf(shot).toFixed(1)} ×`),
  };
}

export const row: Row = {
  name: 'load-lists',
  what: 'L1: every list of the API under 50 connections',
  goal: `no wrong answer, ≥ ${PER_SECOND}/s, 99 % under ${P99_MS} ms, cost ≤ ${COST} × health, each`,
  isFirst: true,
  measure,
};
