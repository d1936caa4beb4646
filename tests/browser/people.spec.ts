import { type Browser, expect, type Page, test } from '@playwright/test';
import { LAB, signIn, statementNumber, watchPage } from './demonstration';

/** A window of one person, signed in. */
async function windowOf(browser: Browser, baseURL: string | undefined, role: string) {
  const context = await browser.newContext({ baseURL });
  const page = await context.newPage();
  await signIn(page, role);
  return page;
}

const step = (page: Page, name: string) => page.getByRole('button', { name, exact: true }).first();

/** Address of the page where a finished run of an analysis is frozen. */
async function openFreezing(page: Page, analysis: string): Promise<void> {
  await page.goto(`${LAB}/analyses/${analysis}`);
  await page
    .getByRole('link', { name: /^Freeze$|^Frozen$/ })
    .first()
    .click();
  await expect(page.getByRole('heading', { level: 1 })).toContainText(`${analysis}, run`);
}

test('an author freezes and releases, two others sign, and a referee and the public read', async ({
  browser,
  baseURL,
}) => {
  test.setTimeout(180_000);
  const author = await windowOf(browser, baseURL, 'author');
  const { faults } = watchPage(author);

  const guest = await test.step('the author freezes a run and gives a referee a link', async () => {
    await openFreezing(author, 'A-3');
    await author.getByLabel('Reason').fill('The candidate lies outside the ranges of this run.');
    await author.getByRole('button', { name: 'Freeze A-3, run 1' }).click();
    await expect(author.getByRole('heading', { level: 1 })).toContainText('is frozen');
    await author.getByRole('button', { name: 'Link for a guest' }).click();
    await author.getByLabel('For whom').fill('referee 1');
    await author.getByRole('button', { name: 'Make the link' }).click();
    const address = await author
      .getByText(/\/guest\/|\/r\//)
      .first()
      .textContent();
    await author.getByRole('button', { name: 'Done' }).click();
    return new URL((address ?? '').trim()).pathname;
  });

  await test.step('the referee reads without an account and leaves a note', async () => {
    const context = await browser.newContext({ baseURL });
    const page = await context.newPage();
    await page.goto(guest);
    await expect(page.locator('body')).toContainText(/<12/);
    await page.getByLabel('Signed as').fill('Referee 1');
    await page.getByLabel('Note', { exact: true }).fill('What if the start is cold?');
    await page.getByRole('button', { name: /note/i }).last().click();
    await expect(page.getByText('What if the start is cold?')).toBeVisible();
    await page.goto(LAB);
    await expect(page).toHaveURL(/sign-in/);
    await context.close();
  });

  const release = await test.step('the author writes the release', async () => {
    await author.getByRole('link', { name: 'Release it' }).click();
    await author.getByLabel('Title').fill('Wide orbits around young stars');
    await author.getByLabel('Abstract').fill('Invented stars, invented planets.');
    await author.getByLabel('Name').first().fill('Rui Castellan');
    await author.getByRole('button', { name: 'Save the draft' }).click();
    await author.waitForURL(/releases\/R-\d+$/);
    return new URL(author.url()).pathname;
  });

  await test.step('a statistician signs, an owner agrees, the run is computed again', async () => {
    const statistician = await windowOf(browser, baseURL, 'statistician');
    await statistician.goto(release);
    await step(statistician, 'Sign off').click();
    await expect(statistician.getByText(/signed/i).first()).toBeVisible();
    const owner = await windowOf(browser, baseURL, 'owner');
    await owner.goto(release);
    await step(owner, 'Agree').click();
    await expect(owner.getByText(/every number is the same to 6 digits/)).toBeVisible({
      timeout: 60_000,
    });
    await statistician.context().close();
    await owner.context().close();
  });

  await test.step('it is published, and anybody reads it', async () => {
    await author.goto(release);
    await step(author, 'Publish').click();
    const link = author.locator('main a[href^="/r/"]').first();
    const open = (await link.getAttribute('href')) ?? '';
    const context = await browser.newContext({ baseURL });
    const page = await context.newPage();
    await expect.poll(async () => (await page.request.get(open)).status()).toBe(200);
    await page.goto(open);
    await expect(page.getByRole('heading', { level: 1 })).toContainText('Wide orbits');
    await expect(page.locator('body')).toContainText(/<12/);
    await context.close();
  });
  expect(faults).toEqual([]);
  await author.context().close();
});

test('an owner settles what new analyses begin with, and finds it in the log', async ({
  browser,
  baseURL,
}) => {
  const owner = await windowOf(browser, baseURL, 'owner');
  await owner.waitForLoadState('networkidle');
  await owner.keyboard.press('/');
  await owner.getByRole('combobox').fill('settings');
  await owner.keyboard.press('Enter');
  await expect(owner.getByRole('heading', { level: 1, name: 'Settings' })).toBeVisible();
  await owner.getByLabel('Credible level').fill('90');
  await owner.getByRole('button', { name: 'Save the rules' }).click();
  await expect(owner.getByText(/saved/i).first()).toBeVisible();
  await owner.goto(`${LAB}/analyses/new`);
  await expect(owner.getByLabel(/Credible level/)).toHaveValue('90');
  await owner.goto(`${LAB}/settings`);
  await owner.getByLabel('Credible level').fill('95');
  await owner.getByRole('button', { name: 'Save the rules' }).click();
  await expect(owner.getByText(/saved/i).first()).toBeVisible();
  await owner.goto(`${LAB}/log`);
  await expect(owner.getByRole('row', { name: /settings|rules/i }).first()).toBeVisible();
  await owner.context().close();
});

test('a collaborator finds a pair of stars to decide and asks colleagues about a survey', async ({
  browser,
  baseURL,
}) => {
  const collaborator = await windowOf(browser, baseURL, 'collaborator');
  await collaborator.goto(`${LAB}/stars/overlaps`);
  await expect(collaborator.getByRole('main')).toContainText('LANTERN 7');
  await collaborator.goto(`${LAB}/surveys/halyard`);
  await collaborator.waitForLoadState('networkidle');
  await collaborator.getByLabel('Begin with a note').fill('Which ages did we use here? ');
  await collaborator.keyboard.press('Control+Enter');
  await expect(collaborator.getByText('Which ages did we use here?')).toBeVisible();
  await collaborator.context().close();
});

test('any limit is read with its conditions and explained in place', async ({
  browser,
  baseURL,
}) => {
  const student = await windowOf(browser, baseURL, 'student');
  await student.goto(`${LAB}/analyses/A-1`);
  await expect(statementNumber(student)).toHaveText(/^<5\.8/);
  await student.waitForLoadState('networkidle');
  await student.getByRole('button', { name: 'What is meant: upper limit' }).first().click();
  await expect(student.getByRole('dialog')).toContainText('posterior holds the credible level');
  await student.keyboard.press('Escape');
  await expect(student.getByRole('dialog')).toHaveCount(0);
  await student.context().close();
});
