import { type Browser, expect, test } from '@playwright/test';
import { LAB, signIn } from './demonstration';

async function windowOf(browser: Browser, baseURL: string | undefined, role: string) {
  const page = await (await browser.newContext({ baseURL })).newPage();
  await signIn(page, role);
  return page;
}

test('two people change the same thing: the second is told, and nothing is lost', async ({
  browser,
  baseURL,
}) => {
  test.setTimeout(120_000);
  const first = await windowOf(browser, baseURL, 'owner');
  const second = await windowOf(browser, baseURL, 'owner');

  await test.step('a survey: the second sees both versions, and keeps theirs knowingly', async () => {
    const words = 'What it searched for';
    for (const page of [first, second]) {
      await page.goto(`${LAB}/surveys/halyard`);
      await page.getByRole('button', { name: /^Change name, band, years/ }).click();
      await expect(page.getByRole('dialog').getByLabel(words)).not.toHaveValue('');
    }
    const [one, other] = [first.getByRole('dialog'), second.getByRole('dialog')];
    const before = await one.getByLabel(words).inputValue();
    await one.getByLabel(words).fill('Words of the first');
    await one.getByRole('button', { name: 'Save' }).click();
    await expect(one).toBeHidden();
    await other.getByLabel(words).fill('Words of the second');
    await other.getByRole('button', { name: 'Save' }).click();
    const notice = other.getByRole('status').filter({ hasText: 'It was changed while you wrote' });
    await expect(notice).toContainText('now: Words of the first');
    await expect(notice).toContainText('yours: Words of the second');
    await expect(other.getByLabel(words)).toHaveValue('Words of the second');
    await first.reload();
    await expect(first.getByText('Words of the first')).toBeVisible();

    await notice.getByRole('button', { name: 'Keep mine over it' }).click();
    await expect(other).toBeHidden();
    await first.reload();
    await expect(first.getByText('Words of the second')).toBeVisible();
    await first.getByRole('button', { name: /^Change name, band, years/ }).click();
    await one.getByLabel(words).fill(before);
    await one.getByRole('button', { name: 'Save' }).click();
    await expect(one).toBeHidden();
  });

  await test.step('settings: the second takes the newer ones, and still sees their own', async () => {
    for (const page of [first, second]) await page.goto(`${LAB}/settings`);
    const [one, other] = [first.getByLabel(/Time zone/), second.getByLabel(/Time zone/)];
    const before = await one.inputValue();
    const save = { name: 'Save', exact: true };
    await one.selectOption('Asia/Tokyo');
    await first.getByRole('button', save).click();
    await expect(first.getByText('Name and dates are saved.')).toBeVisible();
    await other.selectOption('America/Lima');
    await second.getByRole('button', save).click();
    const notice = second.getByRole('status').filter({ hasText: 'It was changed while you wrote' });
    await expect(notice).toContainText('now: Asia/Tokyo');
    await expect(other).toHaveValue('America/Lima');
    await notice.getByRole('button', { name: 'Take the newer one' }).click();
    await expect(other).toHaveValue('Asia/Tokyo');
    await expect(second.getByText('yours: America/Lima')).toBeVisible();
    await other.selectOption(before);
    await second.getByRole('button', save).click();
    await expect(second.getByText('Name and dates are saved.')).toBeVisible();
  });
});
