import { readFile } from 'node:fs/promises';
import { expect, type Page, test } from '@playwright/test';
import { LAB, projectFile, signIn, statementNumber, watchPage } from './demonstration';

/** Reads one file of a kind and waits until its check stands on the page. */
async function read(page: Page, kind: string, file: string): Promise<void> {
  await page.getByRole('radio', { name: kind }).check();
  await page.getByLabel(/Drop files/).setInputFiles(projectFile(file));
}

async function store(page: Page, file: string): Promise<void> {
  const article = page.getByRole('article', { name: file });
  await expect(article.getByText('ready to store')).toBeVisible();
  await page.getByRole('button', { name: `Store ${file}` }).click();
  await expect(article.getByText('stored', { exact: true })).toBeVisible();
}

/** Opens a menu of the bar or of a result and takes one of its entries. */
async function open(page: Page, menu: string | RegExp): Promise<void> {
  await page.getByRole('button', { name: menu }).first().click();
}

async function waitForLimit(page: Page): Promise<string> {
  await expect(statementNumber(page)).toHaveText(/^<\d/, { timeout: 60_000 });
  return (await statementNumber(page).textContent()) ?? '';
}

test('a statistician takes a survey from its files to an upper limit', async ({
  page,
  browser,
  baseURL,
}) => {
  test.setTimeout(150_000);
  const { faults } = watchPage(page);
  const refused = (text: string) => /status of 4\d\d/.test(text);

  await test.step('the overview states the lead limit with its level', async () => {
    await signIn(page, 'statistician');
    await expect(statementNumber(page)).toHaveText(/^<\d\.\d\s?%$/);
    await expect(page.locator('#statement')).toContainText(/95\s?%/);
    await expect(page.locator('#statement')).toContainText('uniform');
    await expect(page.locator('#statement')).toContainText('287 stars, 2 vetted detections');
  });

  await test.step('a new survey', async () => {
    await page.getByRole('link', { name: 'Add a survey' }).first().click();
    await page.getByLabel('Name', { exact: true }).fill('GANNET');
    await page.getByLabel('Band of the contrast curves').fill('K');
    await page.getByLabel('First year').fill('2014');
    await page.getByRole('button', { name: 'Add the survey and import files' }).click();
    await expect(page.getByRole('heading', { name: 'Import into GANNET' })).toBeVisible();
  });

  await test.step('a refused file names the place and stores nothing', async () => {
    await read(page, 'targets', 'tests/fixtures/bad/015-text-in-number.csv');
    const article = page.getByRole('article', { name: '015-text-in-number.csv' });
    await expect(article.getByText('refused, nothing is stored')).toBeVisible();
    await expect(article.getByText(/line 3.*found "n\.d\."/)).toBeVisible();
    await article.getByLabel('Leave a target out').fill('RB 0002');
    await article.getByRole('button', { name: 'Leave out', exact: true }).click();
    await expect(article.getByText('ready to store')).toBeVisible();
    await article.getByRole('button', { name: 'Drop this file' }).click();
    await expect(article).toBeHidden();
  });

  await test.step('targets, and a cooling table that the survey then uses', async () => {
    await read(page, 'targets', 'public/samples/targets.csv');
    await store(page, 'targets.csv');
    await read(page, 'cooling table', 'public/samples/cooling-table.csv');
    await store(page, 'cooling-table.csv');
    await page.getByRole('button', { name: 'Use the table for GANNET' }).click();
    const dialog = page.getByRole('dialog', { name: 'Maps of GANNET' });
    await expect(dialog.getByLabel(/Cooling relation/)).toContainText('cooling-table');
    await dialog.getByRole('button', { name: 'Save' }).click();
    await expect(dialog).toBeHidden();
  });

  await test.step('contrast curves become maps by themselves', async () => {
    await read(page, 'contrast curves', 'public/samples/contrast-curves.csv');
    await expect(page.getByText(/They become maps with cooling-table/)).toBeVisible();
    await store(page, 'contrast-curves.csv');
    await page.getByRole('link', { name: 'Open GANNET' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'GANNET' })).toBeVisible();
    await expect(page.getByText('12of 12', { exact: true })).toBeVisible({ timeout: 60_000 });
    await page.getByRole('button', { name: 'RB 0003' }).click();
    await expect(page.getByRole('img', { name: /detection probability of RB 0003/ })).toBeVisible();
  });

  await test.step('a population with cutoffs', async () => {
    await page.getByRole('link', { name: 'Populations', exact: true }).click();
    await page.getByRole('link', { name: 'New population' }).first().click();
    await page.getByRole('button', { name: /^planet mass, .*: change/ }).click();
    await page.getByLabel('planet mass, lower end, Jupiter masses').fill('4');
    await page.getByLabel('planet mass, upper end, Jupiter masses').fill('60');
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: /^semi-major axis, .*: change/ }).click();
    await page.getByLabel('semi-major axis, lower end, AU').fill('10');
    await page.getByLabel('semi-major axis, upper end, AU').fill('200');
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Save the population' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Name').fill('Massive and near');
    await dialog.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Massive and near' })).toBeVisible();
  });

  let limit = '';
  await test.step('a new analysis and its run', async () => {
    await page.getByRole('link', { name: /in an analysis/ }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'New analysis' })).toBeVisible();
    await expect(page.getByText(/4–60.*10–200/).first()).toBeVisible();
    for (const name of ['SANDBAR', 'HALYARD', 'PETREL', 'CURLEW', 'LANTERN'])
      await page.getByRole('checkbox', { name }).uncheck();
    await page.getByRole('checkbox', { name: 'GANNET' }).check();
    await page.getByLabel('Name', { exact: true }).fill('Twelve stars');
    await page.getByRole('button', { name: 'Create and run' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Twelve stars' })).toBeVisible();
    limit = await waitForLimit(page);
  });

  await test.step('the limit stands with its conditions', async () => {
    const plate = page.locator('#statement');
    await expect(plate).toContainText(/95\s?% credible/);
    await expect(plate).toContainText(/4–60/);
    await expect(plate).toContainText(/10–200/);
    await expect(plate).toContainText('uniform');
    await expect(plate).toContainText('cooling-table');
    await expect(plate.getByRole('img', { name: /[Pp]osterior/ })).toBeVisible();
  });

  await test.step('a control moved by keyboard changes the number, and Undo takes it back', async () => {
    const index = page.getByRole('slider', { name: /Mass index/ });
    await expect(index).toHaveAttribute('aria-valuetext', /limit below/);
    await index.focus();
    await page.keyboard.press('Shift+ArrowRight');
    await page.keyboard.press('Shift+ArrowRight');
    await expect(page.locator('#statement').getByText('live')).toBeVisible();
    await expect(statementNumber(page)).not.toHaveText(limit);
    await page.getByRole('button', { name: 'Undo' }).first().click();
    await expect(statementNumber(page)).toHaveText(limit);
  });

  await test.step('zero detections', async () => {
    const plate = page.locator('#statement');
    await page.getByRole('radio', { name: /^none/ }).check();
    await expect(plate).toContainText('none counted: set aside');
    await page.getByRole('button', { name: 'Undo' }).first().click();
    await expect(plate).not.toContainText('none counted: set aside');
  });

  await test.step('the exported limits carry level, prior and the word draft', async () => {
    await page.getByRole('button', { name: 'Export: files of run 1' }).click();
    const arriving = page.waitForEvent('download');
    await page.getByRole('link', { name: /^CSV\s*, Limits and intervals/ }).click();
    const text = await readFile(await (await arriving).path(), 'utf8');
    expect(text).toContain('0.95');
    expect(text).toContain('uniform');
    expect(text).toContain('draft');
    expect(text).toContain('gannet');
    await page.keyboard.press('Escape');
  });

  await test.step('signing out ends the session on the server too', async () => {
    const kept = await page.context().storageState();
    await open(page, /^Your menu/);
    await page.getByRole('menuitem', { name: 'Sign out' }).click();
    await page.waitForURL('**/sign-in**');
    await page.goto(LAB);
    await expect(page).toHaveURL(/\/sign-in\?next=%2Fbreakwater/);
    const thief = await browser.newContext({ baseURL, storageState: kept });
    expect((await thief.request.get('/api/v1/me')).status()).toBe(401);
    await thief.close();
  });

  // The browser itself reports the refused upload; nothing else may complain.
  expect(faults.filter((text) => !refused(text))).toEqual([]);
});

test('a student sets the detections aside in a copy and compares both', async ({ page }) => {
  test.setTimeout(90_000);
  await signIn(page, 'student');

  const lead = await test.step('the lead analysis is read, and cannot be run', async () => {
    await page.getByRole('link', { name: 'Open A-1' }).click();
    const limit = await waitForLimit(page);
    await expect(page.getByRole('button', { name: 'Run again' }).first()).toHaveAttribute(
      'aria-disabled',
      'true',
    );
    return limit;
  });

  const zero = await test.step('a copy without detections is run', async () => {
    // A click on what the server drew counts once the page's own script has come.
    await page.waitForLoadState('networkidle');
    await page.getByRole('button', { name: 'Copy', exact: true }).first().click();
    await expect(page.getByText('No run yet').first()).toBeVisible();
    await page.getByRole('button', { name: 'Run', exact: true }).click();
    expect(await waitForLimit(page)).toBe(lead);
    await page.getByRole('radio', { name: /^none/ }).check();
    await expect(page.locator('#statement')).toContainText('none counted: set aside');
    await page.getByRole('button', { name: 'Save as run 2' }).first().click();
    await expect(page.getByText(/run 2, all changes saved/).first()).toBeVisible({
      timeout: 60_000,
    });
    const limit = await waitForLimit(page);
    expect(limit).not.toBe(lead);
    return limit;
  });

  await test.step('the copy is called what it is for', async () => {
    await page.getByRole('button', { name: 'Rename' }).click();
    const dialog = page.getByRole('dialog', { name: /^Rename A-/ });
    await dialog.getByLabel('Name').fill('None of them counted');
    await dialog.getByRole('button', { name: 'Save' }).click();
    await expect(dialog).toBeHidden();
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('None of them counted');
  });

  await test.step('both stand on one axis', async () => {
    await page.getByRole('link', { name: 'Compare with A-1' }).first().click();
    await expect(
      page.getByRole('heading', { level: 1, name: /detections and with none/ }),
    ).toBeVisible();
    await expect(statementNumber(page)).toHaveText([lead, zero]);
    const axis = page.locator('#statement').getByRole('img', { name: /[Pp]osterior/ });
    await expect(axis).toBeVisible();
    await expect(page.locator('#statement')).toContainText('zero detections');
  });
});
