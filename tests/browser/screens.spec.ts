import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { LAB, signIn, watchPage } from './demonstration';

// A trace records every element of every chart at each step, which takes longer than the tests.
test.use({ trace: 'off' });

const outside = ['/sign-in', '/sign-up', '/join/no-such-invitation'];
const inside = [
  LAB,
  `${LAB}/surveys`,
  `${LAB}/surveys/new`,
  `${LAB}/surveys/halyard`,
  `${LAB}/surveys/halyard/import`,
  `${LAB}/populations`,
  `${LAB}/populations/P-1`,
  `${LAB}/analyses`,
  `${LAB}/analyses/new`,
  `${LAB}/analyses/A-1`,
  `${LAB}/analyses/A-1/calibration`,
  ...['systematics', 'influence', 'limit-map', 'sweep', 'free-indices'].map(
    (kind) => `${LAB}/analyses/A-1/studies/${kind}`,
  ),
  ...['population-comparison', 'counts', 'overlap-rules'].map(
    (kind) => `${LAB}/analyses/A-1/studies/${kind}`,
  ),
  `${LAB}/compare?with=A-1,A-2`,
  `${LAB}/forecasts`,
  `${LAB}/forecasts/new`,
  `${LAB}/stars`,
  `${LAB}/stars/overlaps`,
  `${LAB}/stars/ages`,
  `${LAB}/stars/samples`,
  `${LAB}/candidates`,
  `${LAB}/surveys/combine`,
  `${LAB}/cooling`,
  `${LAB}/maps`,
  `${LAB}/populations/new`,
  `${LAB}/people`,
  `${LAB}/settings`,
  `${LAB}/settings/work`,
  `${LAB}/me/tokens`,
];

/** Serious and critical findings, each with the first element that it concerns. */
async function findings(page: Page, rules?: string[]): Promise<string[]> {
  // Run within the page, which holds no frame, and without carrying what passed out of it: the large
  // tables take a quarter of the time.
  const builder = new AxeBuilder({ page }).setLegacyMode().options({ resultTypes: ['violations'] });
  const { violations } = await (rules ? builder.withRules(rules) : builder).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes[0].target.join(' ')} (${nodes.length})`);
}

/** How far the page reaches beyond its window [px]. */
const excessWidth = (page: Page) =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

/**
 * One page: no serious finding of axe in light and in dark, nothing that scrolls sideways on a
 * narrow screen, no complaint in the console and no other host. The widths and the themes change
 * by style alone, so the page is loaded once.
 */
async function look(page: Page, address: string): Promise<void> {
  const { faults, stop } = watchPage(page);
  await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
  await page.setViewportSize({ width: 1440, height: 900 });
  await page.goto(address);
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await page.waitForLoadState('networkidle');
  expect(await findings(page), 'in light').toEqual([]);
  await page.emulateMedia({ colorScheme: 'dark' });
  expect(await findings(page, ['color-contrast']), 'in dark').toEqual([]);
  for (const width of [768, 390]) {
    await page.setViewportSize({ width, height: 844 });
    await expect.poll(() => excessWidth(page), { message: `at ${width} px` }).toBe(0);
  }
  stop();
  expect(faults).toEqual([]);
}

for (const address of outside) {
  test(`without a session: ${address}`, ({ page }) => look(page, address));
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

  for (const address of inside) test(address, () => look(page, address));
});
