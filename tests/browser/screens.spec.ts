import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { LAB, signIn, watchPage } from './demonstration';

const open = ['/sign-in', '/sign-up', '/join/no-such-invitation'];
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
  `${LAB}/compare?with=A-1,A-2`,
  `${LAB}/people`,
  `${LAB}/me/tokens`,
];

async function settle(page: Page, address: string): Promise<void> {
  await page.goto(address);
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  await page.waitForLoadState('networkidle');
}

/** Serious and critical findings, each with the first element that it concerns. */
async function findings(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes[0].target.join(' ')} (${nodes.length})`);
}

for (const colorScheme of ['light', 'dark'] as const) {
  test(`no serious finding of axe, no complaint, no other host, ${colorScheme}`, async ({
    page,
  }) => {
    test.setTimeout(120_000);
    await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
    const { faults } = watchPage(page);
    const found: Record<string, string[]> = {};
    const look = async (address: string) => {
      await settle(page, address);
      const list = await findings(page);
      if (list.length > 0) found[address] = list;
    };
    for (const address of open) await look(address);
    await signIn(page, 'owner');
    for (const address of inside) await look(address);
    expect(found).toEqual({});
    expect(faults).toEqual([]);
  });
}

test('nothing scrolls sideways at 390 px', async ({ page }) => {
  test.setTimeout(120_000);
  await page.setViewportSize({ width: 390, height: 844 });
  const wide: string[] = [];
  const look = async (address: string) => {
    await settle(page, address);
    const beyond = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    );
    if (beyond > 0) wide.push(`${address}: ${beyond} px too wide`);
  };
  for (const address of open) await look(address);
  await signIn(page, 'owner');
  for (const address of inside) await look(address);
  expect(wide).toEqual([]);
});
