import { expect, test } from '@playwright/test';
import { LAB, signIn, statementNumber, watchPage } from './demonstration';

test('ages and cooling model are moved under the hand, come back from the address, and are no run', async ({
  page,
}) => {
  const { faults, stop } = watchPage(page);
  await signIn(page, 'statistician');
  await page.goto(`${LAB}/analyses/A-1`);
  const slider = page.getByRole('slider', { name: /^Age shift/ });
  await expect(slider).toHaveAttribute('aria-valuetext', /^Age shift 0\sσ, limit below \d/);
  const recorded = Number((await statementNumber(page).textContent())?.match(/[\d.]+/)?.[0]);
  const models = page
    .getByRole('radiogroup', { name: 'Cooling model' })
    .or(page.getByRole('group', { name: 'Cooling model' }));
  await expect(models.getByRole('radio', { name: /^hot/ })).toBeChecked();

  await slider.press('Shift+ArrowRight');
  await expect(slider).toHaveAttribute('aria-valuetext', /^Age shift \+1\sσ/);
  const limit = async () =>
    Number((await statementNumber(page).textContent())?.match(/[\d.]+/)?.[0]);
  // Older planets are fainter: fewer of them were excluded.
  await expect.poll(limit).toBeGreaterThan(recorded);
  const older = await limit();
  await expect(page.getByText('every star 1\u2009σ older')).toBeVisible();
  await models.getByRole('radio', { name: /^cold/ }).check();
  await expect(page.getByText('Harbour, low-entropy start', { exact: true })).toBeVisible();
  await expect.poll(limit).toBeGreaterThan(older);
  const both = await limit();
  const save = page.getByRole('button', { name: /^Save as run/ });
  await expect(save).toHaveAttribute('aria-disabled', 'true');
  await expect(save).toHaveAccessibleDescription(/adopt ages under Stars/);

  await expect(page).toHaveURL(/age=1&cooling=/);
  await page.reload();
  await expect.poll(limit).toBe(both);
  await slider.press('ArrowLeft');
  await expect(page.getByText(/every star 0\.9\u2009σ older, between/)).toBeVisible();
  await page.getByRole('button', { name: 'Undo' }).click();
  await expect.poll(limit).toBe(recorded);

  // Another analysis of the same stars has no such maps yet; the workers find those of the first.
  await page.goto(`${LAB}/analyses/A-4`);
  const index = page.getByRole('slider', { name: /^Mass index/ });
  await expect(index).toHaveAttribute('aria-valuetext', /limit below \d/);
  await page.getByRole('button', { name: 'Make their maps' }).click();
  await expect(page.getByRole('slider', { name: /^Age shift/ })).toBeVisible({ timeout: 90_000 });
  await expect(page.getByRole('button', { name: 'Make their maps' })).toBeHidden();
  stop();
  expect(faults).toEqual([]);
});

test('what is kept to compare with comes back with the address', async ({ page }) => {
  await signIn(page, 'statistician');
  await page.goto(`${LAB}/analyses/A-1`);
  // Until then the page does not listen.
  const index = page.getByRole('slider', { name: /^Mass index/ });
  await expect(index).toHaveAttribute('aria-valuetext', /limit below \d/);
  const choice = page.getByRole('combobox', { name: 'Limit without some stars' });
  await choice.selectOption({ label: 'all 2 hosts of detections' });
  await page.getByRole('button', { name: 'Keep as a comparison' }).click();
  const kept = page.getByRole('listitem').filter({ hasText: 'without the 2 hosts' });
  await expect(kept).toHaveText(/^<\d.*and their 2 detections.*times the limit/);
  const words = (await kept.textContent()) ?? '';
  await expect(page).toHaveURL(/#without=\d+~/);
  await page.reload();
  await expect(kept).toHaveText(words);
  await kept.getByRole('button', { name: 'Drop' }).click();
  await expect(page).not.toHaveURL(/#/);
});
