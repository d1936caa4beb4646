import path from 'node:path';
import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { markColours } from './colours';
import { signIn, watchPage } from './demonstration';
import { addressOf, fileNameOf, labScreens, openScreens } from './screens';

// A trace records every element of every chart at each step, which takes longer than the tests.
test.use({ trace: 'off' });

/** Where pictures of every screen go; without it none are taken. */
const pictures = process.env.SCREEN_PICTURES;
const CONTRAST = 'color-contrast';
const windows = [
  { width: 1440, height: 900 },
  { width: 768, height: 844 },
  { width: 390, height: 844 },
];

/** A picture at each width in each theme. */
async function takePictures(page: Page, screen: string): Promise<void> {
  if (pictures === undefined) return;
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    for (const size of windows) {
      await page.setViewportSize(size);
      const name = `${fileNameOf(screen)}-${size.width}-${colorScheme}.jpg`;
      const file = path.join(pictures, name);
      await page.screenshot({ path: file, fullPage: true, type: 'jpeg', quality: 80 });
    }
  }
}

/** Serious and critical findings, each with the first element that it concerns. */
async function findings(
  page: Page,
  narrow: (builder: AxeBuilder) => AxeBuilder,
): Promise<string[]> {
  // Run within the page, which holds no frame, and without carrying what passed out of it: the large
  // tables take a quarter of the time.
  const builder = new AxeBuilder({ page }).setLegacyMode().options({ resultTypes: ['violations'] });
  const { violations } = await narrow(builder).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes[0].target.join(' ')} (${nodes.length})`);
}

/** Of the contrast of text, in the theme that the page has now. */
async function contrastFindings(page: Page): Promise<string[]> {
  const marked = await markColours(page);
  return findings(page, (builder) => builder.include(marked).withRules([CONTRAST]));
}

/** How far the page reaches beyond its window [px]. */
const excessWidth = (page: Page) =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

/**
 * One page: no serious finding of axe in light and in dark, nothing that scrolls sideways on a
 * narrow screen, no complaint in the console and no other host. The widths and the themes change
 * by style alone, so the page is loaded once.
 */
async function look(page: Page, screen: string): Promise<void> {
  const address = await addressOf(page.request, screen);
  const { faults, stop } = watchPage(page);
  await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
  await page.setViewportSize({ width: 1440, height: 900 });
  const answer = await page.goto(address);
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await page.waitForLoadState('networkidle');
  expect(await findings(page, (builder) => builder.disableRules([CONTRAST]))).toEqual([]);
  expect(await contrastFindings(page), 'in light').toEqual([]);
  await page.emulateMedia({ colorScheme: 'dark' });
  expect(await contrastFindings(page), 'in dark').toEqual([]);
  for (const width of [768, 390]) {
    await page.setViewportSize({ width, height: 844 });
    await expect.poll(() => excessWidth(page), { message: `at ${width} px` }).toBe(0);
  }
  await takePictures(page, screen);
  stop();
  // A browser reports that a page it was sent to does not exist.
  const expected = answer?.status() === 404 ? [expect.stringContaining('404')] : [];
  expect(faults).toEqual(expected);
}

for (const screen of openScreens.filter((one) => !one.includes('{'))) {
  test(`without a session: ${screen}`, ({ page }) => look(page, screen));
}

test.describe('of a collaboration', () => {
  // Half the pages in each of the two processes, whichever is free.
  test.describe.configure({ mode: 'parallel' });
  // One window for all of them: what they share is fetched and compiled once, as for a person.
  let page: Page;

  test.beforeAll(async ({ browser, baseURL }) => {
    const context = await browser.newContext({ baseURL });
    page = await context.newPage();
    await signIn(page, 'owner');
  });

  test.afterAll(() => page.context().close());

  for (const screen of [...labScreens, ...openScreens.filter((one) => one.includes('{'))]) {
    test(screen, () => look(page, screen));
  }
});
