import { type Browser, expect, type Page, test } from '@playwright/test';
import { LAB, signIn } from './demonstration';

const FIELD = 'What it searched for';

async function pageOf(browser: Browser, baseURL: string | undefined, role: string): Promise<Page> {
  const page = await (await browser.newContext({ baseURL })).newPage();
  await signIn(page, role);
  await page.goto(`${LAB}/surveys/petrel`);
  return page;
}

/** Opens the form of the survey's facts; until the page is alive a press does nothing. */
async function openFacts(page: Page) {
  const dialog = page.getByRole('dialog');
  await expect(async () => {
    await page.getByRole('button', { name: /^Change name, band, years/ }).click();
    await expect(dialog.getByLabel(FIELD)).toBeVisible({ timeout: 3000 });
  }).toPass();
  const field = dialog.getByLabel(FIELD);
  return {
    dialog,
    field,
    notice: dialog.getByRole('status').filter({ hasText: 'yours:' }),
    async save(words: string) {
      await field.fill(words);
      await dialog.getByRole('button', { name: 'Save' }).click();
    },
  };
}

test('a draft that somebody changed since is not deleted unseen', async ({ browser, baseURL }) => {
  const page = await pageOf(browser, baseURL, 'owner');
  const headers = { origin: new URL(page.url()).origin };
  const api = `/api/v1/collaborations${LAB}/analyses`;
  const { recipe } = await (await page.request.get(`${api}/A-1`)).json();
  const data = { name: 'A draft of two people', recipe };
  const made = await page.request.post(api, { headers, data });
  expect(made.status()).toBe(201);
  const { key } = await made.json();
  await page.goto(`${LAB}/analyses/${key}`);
  const first = page.getByRole('button', { name: 'Delete the draft' });
  const second = page.getByRole('button', { name: 'Delete it' });
  await expect(async () => {
    await first.click();
    await expect(second).toBeVisible({ timeout: 3000 });
  }).toPass();
  const change = { recipe: { ...recipe, credibleLevel: 0.68 } };
  const changed = await page.request.patch(`${api}/${key}`, { headers, data: change });
  expect(changed.status()).toBe(200);

  await second.click();
  await expect(page.getByText('Nothing was deleted.')).toBeVisible();
  await expect(page.getByText('It was changed since this page was opened')).toBeVisible();
  await expect(page.locator('dd', { hasText: /^68/ })).toBeVisible();
  await second.click();
  await page.waitForURL(`**${LAB}/analyses`);
  expect((await page.request.get(`${api}/${key}`)).status()).toBe(404);
});

test('two people change one survey: the second is told, and nothing is lost', async ({
  browser,
  baseURL,
}) => {
  const owner = await pageOf(browser, baseURL, 'owner');
  const lead = await pageOf(browser, baseURL, 'collaborator');
  let before = '';

  await test.step('the second sees both versions, and keeps theirs knowingly', async () => {
    const [first, second] = [await openFacts(owner), await openFacts(lead)];
    before = await first.field.inputValue();
    await first.save('Words of the owner');
    await expect(first.dialog).toBeHidden();
    await second.save('Words of the lead');
    await expect(second.notice).toContainText('It was changed while you wrote.');
    await expect(second.notice).toContainText('Ilse Marrand');
    await expect(second.notice).toContainText('now: Words of the owner');
    await expect(second.notice).toContainText('yours: Words of the lead');
    await owner.reload();
    await expect(owner.getByText('Words of the owner')).toBeVisible();

    await second.notice.getByRole('button', { name: 'Keep mine over it' }).click();
    await expect(second.dialog).toBeHidden();
    await owner.reload();
    await expect(owner.getByText('Words of the lead')).toBeVisible();
  });

  await test.step('or takes the newer one, and still has their own words in sight', async () => {
    await lead.reload();
    const [second, first] = [await openFacts(owner), await openFacts(lead)];
    await first.save('Newer words of the lead');
    await expect(first.dialog).toBeHidden();
    await second.save('Later words of the owner');
    await second.notice.getByRole('button', { name: 'Take the newer one' }).click();
    await expect(second.field).toHaveValue('Newer words of the lead');
    await expect(second.notice).toContainText('yours: Later words of the owner');
    await second.save(before);
    await expect(second.dialog).toBeHidden();
    await lead.reload();
    await expect(lead.getByText('Newer words of the lead')).toBeHidden();
  });
});
