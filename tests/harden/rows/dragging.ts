import path from 'node:path';
import type { Locator, Page } from '@playwright/test';
import { Api } from '../api';
import { openLaboratory } from '../browser';
import { type Frames, watchFrames } from '../frames';
import { curvesFile, oneSurvey, targetsFile } from '../invented-sky';
import type { Bench, Measured, Row } from '../row';

const POINTS = 20;
const SECONDS = 4;
/** As a hand moves: so many positions a second, whatever the page makes of them. */
const MOVES_PER_SECOND = 60;
/** Longer than what is shown a moment later than the limit. */
const REST_MS = 300;
const MOST_P95_MS = 1.5 * (1000 / 60);
const MOST_DROPPED = 0.05;
const starCount = () => Number(process.env.HARDEN_STARS ?? 500);

const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

/** A survey of so many stars with maps, and an analysis of it with a finished run. */
async function inventAnalysis(api: Api, stars: number): Promise<string> {
  const survey = oneSurvey('KNOT', stars);
  const { id } = await api.post<{ id: string }>('surveys', { name: survey.name, band: 'H' });
  const files = [
    ['targets', targetsFile(survey)],
    ['contrast-curves', curvesFile(survey, POINTS)],
  ] as const;
  for (const [kind, text] of files) {
    const bytes = new TextEncoder().encode(text);
    const sent = await api.upload(kind, survey.slug, `knot-${kind}.csv`, bytes);
    await api.store(sent.id);
  }
  const { recipe } = await api.read<{ recipe: Record<string, unknown> }>('analyses/A-1');
  const { key } = await api.post<{ key: string }>('analyses', {
    name: 'Under a hand',
    recipe: {
      surveyIds: [id],
      populationId: recipe.populationId,
      likelihood: 'host-fraction',
      prior: { law: 'uniform', max: 1 },
      zeroOutsideMaps: true,
    },
  });
  await waitForMaps(api, survey.slug);
  await api.post(`analyses/${key}/runs`, {});
  for (;;) {
    const { state } = await api.read<{ state: string }>(`analyses/${key}`);
    if (state === 'run') return key;
    if (state === 'failed') throw new Error('the run failed');
    await pause(500);
  }
}

async function waitForMaps(api: Api, slug: string): Promise<void> {
  for (;;) {
    const { mapJob } = await api.read<{ mapJob: { status: string } | null }>(`surveys/${slug}`);
    if (mapJob?.status === 'done') return;
    if (mapJob?.status === 'failed') throw new Error('the maps failed');
    await pause(500);
  }
}

const middleOf = async (handle: Locator) => {
  await handle.scrollIntoViewIfNeeded();
  const box = await handle.boundingBox();
  if (!box) throw new Error('the handle is not in sight');
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
};

interface Drag {
  frames: Frames;
  /** What the page showed while the hand was furthest from where it began. */
  limitOnTheWay: string | null;
}

/** Presses there and moves to and fro for some seconds, then rests at the end of its reach. */
async function drag(
  page: Page,
  from: { x: number; y: number },
  reach: { x: number; y: number },
  limit: Locator,
): Promise<Drag> {
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  const frames = await watchFrames(page, async () => {
    const start = Date.now();
    for (let move = 0; Date.now() - start < 1000 * SECONDS; move++) {
      const swing = Math.sin((2 * Math.PI * move) / MOVES_PER_SECOND);
      await page.mouse.move(from.x + swing * reach.x, from.y + swing * reach.y);
      await pause(Math.max(0, start + (1000 * (move + 1)) / MOVES_PER_SECOND - Date.now()));
    }
  });
  await page.mouse.move(from.x + reach.x, from.y + reach.y);
  await pause(REST_MS);
  const limitOnTheWay = await limit.textContent();
  await page.mouse.up();
  return { frames, limitOnTheWay };
}

const words = (name: string, { count, p50Ms, p95Ms, droppedShare, longTasks }: Frames) =>
  `${name}: ${count} frames, ${p50Ms.toFixed(1)} ms at the median, ${p95Ms.toFixed(1)} ms at 95 %, ` +
  `${(100 * droppedShare).toFixed(1)} % dropped, ${longTasks} long tasks`;

async function measure({ product, say, folder }: Bench): Promise<Measured> {
  const stars = starCount();
  const running = await product();
  const key = await inventAnalysis(new Api(running), stars);
  say(`${key} has its run of ${stars} stars`);
  const { browser, page, faults } = await openLaboratory(running, 'owner');
  try {
    await page.goto(`/breakwater/analyses/${key}`);
    const number = page.locator('#statement .statement-number');
    await page.getByText(/^Fetching the maps/).waitFor({ state: 'hidden' });
    const before = await number.textContent();
    const idle = await watchFrames(page, () => pause(2000));
    const index = page.getByRole('slider', { name: /Mass index/ });
    const knob = await middleOf(index);
    const ofIndex = await drag(page, knob, { x: 60, y: 0 }, number);
    const between = await number.textContent();
    const side = page.getByRole('slider', { name: 'Largest semi-major axis' }).first();
    const ofCutoff = await drag(page, await middleOf(side), { x: -60, y: 0 }, number);
    const [indexDrag, cutoffDrag] = [ofIndex.frames, ofCutoff.frames];
    const drags = [indexDrag, cutoffDrag];
    const limits = [before, ofIndex.limitOnTheWay, between, ofCutoff.limitOnTheWay];
    const isFollowing = limits[0] !== limits[1] && limits[2] !== limits[3];
    return {
      isMet:
        isFollowing &&
        faults.length === 0 &&
        drags.every((one) => one.p95Ms <= MOST_P95_MS && one.droppedShare <= MOST_DROPPED),
      figure: [
        `${stars} stars`,
        words('untouched', idle),
        words('index', indexDrag),
        words('cut-off on the map', cutoffDrag),
      ].join('; '),
      details: { stars, idle, indexDrag, cutoffDrag, limits },
      notes: isFollowing ? faults : [...faults, `the limit did not follow: ${limits.join(', ')}`],
    };
  } catch (error) {
    await page.screenshot({ path: path.join(folder, 'stopped.png'), fullPage: true });
    throw error;
  } finally {
    await browser.close();
  }
}

export const row: Row = {
  name: 'dragging',
  what: 'an index and a cut-off on the map, dragged for four seconds each with 500 stars',
  goal: `60 frames a second: 95 % of them within ${MOST_P95_MS.toFixed(0)} ms, at most ${100 * MOST_DROPPED} % dropped`,
  measure,
};
