import type { Page } from '@playwright/test';

/** What a page showed while nobody touched it. */
export interface Vitals {
  /** Largest contentful paint after the start of the navigation [ms], and what it was. */
  paintMs: number;
  painted: string;
  /** Sum of all layout shifts, and what moved in them. */
  shift: number;
  moved: string[];
  /** Compressed JavaScript that had come by then, whatever asked for it [kB]. */
  scriptKb: number;
}

/** Longer than what a page still asks for by itself takes to come. */
const QUIET_MS = 700;

interface Paint extends PerformanceEntry {
  element: Element | null;
}
interface Shift extends PerformanceEntry {
  value: number;
  hadRecentInput: boolean;
  sources: { node: Node | null }[];
}
declare global {
  interface Window {
    vitals: Omit<Vitals, 'scriptKb'>;
  }
}

/** Runs in the page before its own scripts do. */
function observeVitals(): void {
  const name = (node: Node | null) => {
    const element = node instanceof Element ? node : node?.parentElement;
    if (!element) return 'something that is gone';
    const words = (element.textContent ?? '').trim().replaceAll(/\s+/g, ' ').slice(0, 40);
    return `<${element.tagName.toLowerCase()} class="${element.getAttribute('class') ?? ''}"> ${words}`;
  };
  const vitals = { paintMs: 0, painted: '', shift: 0, moved: [] as string[] };
  window.vitals = vitals;
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries() as Paint[]) {
      vitals.paintMs = entry.startTime;
      vitals.painted = name(entry.element);
    }
  }).observe({ type: 'largest-contentful-paint', buffered: true });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries() as Shift[]) {
      if (entry.hadRecentInput) continue;
      vitals.shift += entry.value;
      vitals.moved.push(
        `${entry.value.toFixed(3)} at ${entry.startTime.toFixed(0)} ms: ${entry.sources.map(({ node }) => name(node)).join('; ')}`,
      );
    }
  }).observe({ type: 'layout-shift', buffered: true });
}

export const watchVitals = (page: Page) => page.addInitScript(observeVitals);

/** Opens an address and waits until nothing comes any more. */
export async function visit(page: Page, address: string): Promise<Vitals> {
  await page.goto(address);
  await page.waitForLoadState('networkidle');
  await page.waitForTimeout(QUIET_MS);
  return page.evaluate(() => {
    const scripts = performance
      .getEntriesByType('resource')
      .filter((entry) => new URL(entry.name).pathname.endsWith('.js'));
    const bytes = (scripts as PerformanceResourceTiming[]).reduce(
      (sum, { encodedBodySize }) => sum + encodedBodySize,
      0,
    );
    return { ...window.vitals, scriptKb: bytes / 1000 };
  });
}
