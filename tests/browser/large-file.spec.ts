import { expect, test } from '@playwright/test';
import { LAB, signIn } from './demonstration';

const PART_BYTES = 8 * 2 ** 20;

test('a large file goes on where the connection broke', async ({ page }) => {
  test.setTimeout(90_000);
  await signIn(page, 'owner');
  await page.goto(`${LAB}/surveys/new`);
  await page.getByLabel('Name', { exact: true }).fill('DUNLIN');
  await page.getByLabel('Band of the contrast curves').fill('H');
  await page.getByLabel('First year').fill('2019');
  await page.getByRole('button', { name: 'Add the survey and import files' }).click();
  await expect(page.getByRole('heading', { name: 'Import into DUNLIN' })).toBeVisible();
  const note = 'A long note. '.repeat(4000);
  const lines = Array.from({ length: 190 }, (_, i) => `DUNLIN ${i},20,100,${note}`);
  const buffer = Buffer.from(`name,distance,age,notes\n${lines.join('\n')}\n`);
  expect(buffer.length).toBeGreaterThan(PART_BYTES);
  const offsets: string[] = [];
  await page.route('**/unfinished-files/*', async (route, request) => {
    const offset = request.headers()['upload-offset'];
    if (request.method() !== 'PATCH') return route.continue();
    offsets.push(offset);
    // The second part is lost once.
    return offsets.filter((one) => one !== '0').length === 1 ? route.abort() : route.continue();
  });
  await page.getByRole('radio', { name: 'targets' }).check();
  await page
    .getByLabel(/Drop files/)
    .setInputFiles({ name: 'long.csv', mimeType: 'text/csv', buffer });
  const article = page.getByRole('article', { name: 'long.csv' });
  await expect(article.getByText('ready to store')).toBeVisible({ timeout: 60_000 });
  expect(offsets).toEqual(['0', String(PART_BYTES), String(PART_BYTES)]);
  await expect(article).toContainText('190 targets: 190 new');
  await expect(article.getByText(/^A long note.{1,120}…$/).first()).toBeVisible();
});
