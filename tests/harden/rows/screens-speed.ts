import type { Browser, BrowserContext } from '@playwright/test';
import { addressOf, labScreens, openScreens } from '@/tests/browser/screens';
import { openLaboratory } from '../browser';
import type { Bench, Measured, Row } from '../row';
import { type Vitals, visit, watchVitals } from '../vitals';

const MOST_PAINT_MS = 1500;
/** What the eye cannot see: half a pixel of a line that is rounded anew. */
const MOST_SHIFT = 0.01;
const WORST = 8;
const rounds = () => Number(process.env.HARDEN_ROUNDS ?? 3);
/** Part of an address, for trying out. */
const wanted = () => process.env.HARDEN_SCREENS ?? '';

interface ScreenSpeed {
  screen: string;
  cold: Vitals;
  warm: Vitals;
}

const middle = (values: number[]) => [...values].sort((a, b) => a - b)[values.length >> 1];

/** The median of each figure, with what was seen in the round where most moved. */
function medianOf(visits: Vitals[]): Vitals {
  const paintMs = middle(visits.map((one) => one.paintMs));
  const shift = middle(visits.map((one) => one.shift));
  const most = visits.reduce((a, b) => (b.shift > a.shift ? b : a));
  return { ...most, paintMs, shift, scriptKb: middle(visits.map((one) => one.scriptKb)) };
}

/** Each round with a cache of its own that is empty at the first visit and full at the second. */
async function measureScreen(
  browser: Browser,
  state: Awaited<ReturnType<BrowserContext['storageState']>>,
  options: { baseURL: string; screen: string; address: string },
): Promise<ScreenSpeed> {
  const cold: Vitals[] = [];
  const warm: Vitals[] = [];
  for (let round = 0; round < rounds(); round++) {
    const context = await browser.newContext({
      baseURL: options.baseURL,
      storageState: state,
      viewport: { width: 1440, height: 900 },
    });
    const page = await context.newPage();
    await watchVitals(page);
    cold.push(await visit(page, options.address));
    warm.push(await visit(page, options.address));
    await context.close();
  }
  return { screen: options.screen, cold: medianOf(cold), warm: medianOf(warm) };
}

/** The worker publishes the release last of what the demonstration has. */
async function waitForDemonstration(context: BrowserContext): Promise<void> {
  for (let second = 0; ; second++) {
    const answer = await context.request.get('/r/'.concat(await codeOrNothing(context)));
    if (answer.ok()) return;
    if (second > 240) throw new Error('the demonstration has no published release');
    await new Promise((resolve) => setTimeout(resolve, 1000));
  }
}

const codeOrNothing = (context: BrowserContext) =>
  addressOf(context.request, '{code}').catch(() => 'none-yet');

async function measure({ product, say }: Bench): Promise<Measured> {
  const running = await product();
  const { browser, page } = await openLaboratory(running, 'owner');
  try {
    const context = page.context();
    await waitForDemonstration(context);
    const state = await context.storageState();
    const screens = [...openScreens, ...labScreens].filter((one) => one.includes(wanted()));
    const speeds: ScreenSpeed[] = [];
    for (const screen of screens) {
      const address = await addressOf(context.request, screen);
      const isOpen = openScreens.includes(screen);
      const who = isOpen ? { cookies: [], origins: [] } : state;
      const options = { baseURL: running.address, screen, address };
      const speed = await measureScreen(browser, who, options);
      speeds.push(speed);
      say(lineOf(speed));
    }
    return sumUp(speeds);
  } finally {
    await browser.close();
  }
}

const lineOf = ({ screen, cold, warm }: ScreenSpeed) =>
  `${screen}: ${cold.paintMs.toFixed(0)} ms cold, ${warm.paintMs.toFixed(0)} ms warm; ` +
  `shift ${cold.shift.toFixed(3)}, ${warm.shift.toFixed(3)}; ${cold.scriptKb.toFixed(0)} kB of scripts`;

function sumUp(speeds: ScreenSpeed[]): Measured {
  const paint = ({ cold, warm }: ScreenSpeed) => Math.max(cold.paintMs, warm.paintMs);
  const shift = ({ cold, warm }: ScreenSpeed) => Math.max(cold.shift, warm.shift);
  const slow = speeds.filter((one) => paint(one) >= MOST_PAINT_MS);
  const moving = speeds.filter((one) => shift(one) >= MOST_SHIFT);
  const slowest = [...speeds].sort((a, b) => paint(b) - paint(a)).slice(0, WORST);
  const mostMoving = [...moving].sort((a, b) => shift(b) - shift(a)).slice(0, WORST);
  const medians = (which: 'cold' | 'warm') =>
    middle(speeds.map((one) => one[which].paintMs)).toFixed(0);
  return {
    isMet: speeds.length > 0 && slow.length === 0 && moving.length === 0,
    figure:
      `${speeds.length} screens, largest paint at ${medians('cold')} ms cold and ` +
      `${medians('warm')} ms warm (medians); ${slow.length} screens slower than the goal, ` +
      `${moving.length} whose parts move`,
    details: { speeds },
    notes: [
      ...slowest.map((one) => `slowest: ${lineOf(one)} (${one.cold.painted})`),
      ...mostMoving.flatMap(({ screen, cold, warm }) =>
        [...cold.moved, ...warm.moved].map((moved) => `moves: ${screen}: ${moved}`),
      ),
    ],
  };
}

export const row: Row = {
  name: 'screens-speed',
  what: 'every screen in Chromium, three times with an empty cache and three with a full one',
  isFirst: true,
  goal: `largest contentful paint under ${MOST_PAINT_MS} ms, layout shift under ${MOST_SHIFT}`,
  measure,
};
