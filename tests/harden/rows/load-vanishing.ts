import http from 'node:http';
import { setTimeout as pause } from 'node:timers/promises';
import { Api } from '../api';
import { withRows } from '../laboratory-rows';
import { LAB } from '../load-addresses';
import { LongJobs } from '../long-jobs';
import { openSockets } from '../memory';
import type { Bench, Measured, Row, RunningProduct } from '../row';
import { signedIn, signInOf } from '../visitor';

const CLIENTS = 200;
const ASK_MS = 1000;
const WATCH_S = 10;
const BACK_S = 10;
const QUIET_SAMPLES = 10;

interface Held {
  sockets: number;
  databaseConnections: number;
}

/** Sockets of the web server, and its sessions in the database. */
async function readHeld(product: RunningProduct): Promise<Held> {
  const rows = await withRows(product, (query) =>
    query<{ count: number }>(
      `select count(*)::int as count from pg_stat_activity
       where datname = current_database() and application_name <> 'harden'`,
    ),
  );
  return { sockets: openSockets(product.pidOf('web')), databaseConnections: rows[0].count };
}

/** The most in some seconds of quiet: the worker opens and closes connections too. */
async function readStart(product: RunningProduct): Promise<Held> {
  // What the start itself opened closes first.
  await pause(1000 * BACK_S);
  const most = await readHeld(product);
  for (let i = 0; i < QUIET_SAMPLES; i++) {
    await pause(500);
    const held = await readHeld(product);
    most.sockets = Math.max(most.sockets, held.sockets);
    most.databaseConnections = Math.max(most.databaseConnections, held.databaseConnections);
  }
  return most;
}

/** Asks how far a job is, again and again over a connection of its own, until it is cut off. */
class Watcher {
  readonly answers = { right: 0, wrong: 0 };
  private readonly agent = new http.Agent({ keepAlive: true, maxSockets: 1 });
  private request: http.ClientRequest | undefined;
  private timer: NodeJS.Timeout | undefined;
  private isGone = false;

  constructor(
    private readonly address: string,
    private readonly cookie: string,
  ) {
    this.timer = setTimeout(() => this.ask(), Math.random() * ASK_MS);
  }

  private ask(): void {
    const { agent, cookie } = this;
    this.request = http.get(this.address, { agent, headers: { cookie } }, (answer) => {
      if (answer.statusCode === 200) this.answers.right++;
      else this.answers.wrong++;
      answer.resume();
      answer.once('end', () => {
        this.timer = setTimeout(() => this.ask(), ASK_MS);
      });
      answer.once('error', () => {});
    });
    this.request.once('error', () => {
      if (!this.isGone) this.answers.wrong++;
    });
  }

  /** Gone in the middle of a request: one more is sent and the line is cut before its answer. */
  vanish(): void {
    this.isGone = true;
    clearTimeout(this.timer);
    this.ask();
    setTimeout(() => {
      this.request?.destroy();
      this.agent.destroy();
    }, 5);
  }
}

async function measure({ product, say }: Bench): Promise<Measured> {
  const running = await product();
  const cookie = await signedIn(running, signInOf(running, 'owner'));
  const jobs = new LongJobs(new Api(running));
  await jobs.keep(1);
  try {
    const address = `${running.address}/api/v1/collaborations/${LAB}/jobs/${jobs.ids[0]}`;
    const before = await readStart(running);
    const watchers = Array.from({ length: CLIENTS }, () => new Watcher(address, cookie));
    await pause(1000 * WATCH_S);
    const during = await readHeld(running);
    say(`${during.sockets} sockets, ${during.databaseConnections} database connections`);
    for (const watcher of watchers) watcher.vanish();
    const start = performance.now();
    const seconds = () => (performance.now() - start) / 1000;
    const isBack = ({ sockets, databaseConnections }: Held) =>
      sockets <= before.sockets && databaseConnections <= before.databaseConnections;
    await pause(100);
    let after = await readHeld(running);
    while (!isBack(after) && seconds() < 3 * BACK_S) {
      await pause(250);
      after = await readHeld(running);
    }
    const backS = seconds();
    const right = watchers.reduce((sum, { answers }) => sum + answers.right, 0);
    const wrong = watchers.reduce((sum, { answers }) => sum + answers.wrong, 0);
    const wasCrowd = during.sockets - before.sockets >= CLIENTS;
    return {
      isMet: wasCrowd && wrong === 0 && isBack(after) && backS <= BACK_S,
      figure:
        `${CLIENTS} clients, ${right} answers in ${WATCH_S} s, ${wrong} wrong; sockets ` +
        `${before.sockets}, ${during.sockets}, ${after.sockets}; database connections ` +
        `${before.databaseConnections}, ${during.databaseConnections}, ` +
        `${after.databaseConnections}; ${isBack(after) ? 'back' : 'not back'} after ${backS.toFixed(1)} s`,
      details: { clients: CLIENTS, right, wrong, before, during, after, backS },
    };
  } finally {
    await jobs.stop();
  }
}

export const row: Row = {
  name: 'load-vanishing',
  what: 'L5: 200 clients that follow a job and vanish in the middle of a request',
  goal: `sockets and database connections back to the start within ${BACK_S} s`,
  measure,
};
