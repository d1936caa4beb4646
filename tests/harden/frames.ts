import type { Page } from '@playwright/test';

export interface Frames {
  count: number;
  /** Time between two frames [ms]. */
  p50Ms: number;
  p95Ms: number;
  /** Share of frames that did not come: those for which there was time between two that did. */
  droppedShare: number;
  /** Work on the page's thread of over 50 ms. */
  longTasks: number;
  longestTaskMs: number;
}

const FRAME_MS = 1000 / 60;

declare global {
  interface Window {
    frameTimes: number[];
    taskTimes: number[];
    areFramesWatched: boolean;
  }
}

/** Frames of a page from now until `act` has ended. */
export async function watchFrames(page: Page, act: () => Promise<void>): Promise<Frames> {
  await page.evaluate(() => {
    window.frameTimes = [];
    window.taskTimes = [];
    window.areFramesWatched = true;
    new PerformanceObserver((list) => {
      for (const { duration } of list.getEntries()) {
        if (window.areFramesWatched) window.taskTimes.push(duration);
      }
    }).observe({ type: 'longtask' });
    const next = (at: number) => {
      if (!window.areFramesWatched) return;
      window.frameTimes.push(at);
      requestAnimationFrame(next);
    };
    requestAnimationFrame(next);
  });
  await act();
  const { times, tasks } = await page.evaluate(() => {
    window.areFramesWatched = false;
    return { times: window.frameTimes, tasks: window.taskTimes };
  });
  const gaps = times.slice(1).map((at, i) => at - times[i]);
  if (gaps.length < 10) throw new Error(`only ${gaps.length} frames were seen`);
  const sorted = [...gaps].sort((a, b) => a - b);
  const at = (share: number) => sorted[Math.floor(share * (sorted.length - 1))];
  const missed = gaps.reduce((sum, gap) => sum + Math.max(0, Math.round(gap / FRAME_MS) - 1), 0);
  return {
    count: gaps.length,
    p50Ms: at(0.5),
    p95Ms: at(0.95),
    droppedShare: missed / (gaps.length + missed),
    longTasks: tasks.length,
    longestTaskMs: Math.max(0, ...tasks),
  };
}
