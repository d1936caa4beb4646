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
