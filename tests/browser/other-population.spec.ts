import { readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from '@playwright/test';
import { LAB, signIn, statementNumber, watchPage } from './demonstration';

interface Listed {
  id: string;
  key: string;
  name: string;
  definition: { form: string };
}

/** A run of a broken law has everything that a run of a single one has, but for live controls. */
test('an analysis of a broken law shows its posterior, limits, map and stars, and can be frozen', async ({
  page,
  request,
}) => {
  const token = readFileSync(path.join(process.env.RAREBOUND_DATA_DIR ?? '', 'demo-token'), 'utf8');
  const headers = { authorization: `Bearer ${token.trim()}` };
  const api = `/api/v1/collaborations${LAB}`;
  const { populations } = (await (await request.get(`${api}/populations`, { headers })).json()) as {
    populations: Listed[];
  };
  const broken = populations.find(({ name }) => name === 'Few beyond 60 AU');
  const lead = await (await request.get(`${api}/analyses/A-1`, { headers })).json();
  const made = await request.post(`${api}/analyses`, {
    headers,
    data: { name: 'A broken law', recipe: { ...lead.recipe, populationId: broken?.id } },
  });
  expect(made.status(), await made.text()).toBe(201);
  const { key } = await made.json();
  const started = await request.post(`${api}/analyses/${key}/runs`, { headers });
  const { job } = await started.json();
  await expect
    .poll(
      async () => (await (await request.get(`${api}/jobs/${job.id}`, { headers })).json()).status,
      {
        timeout: 60_000,
      },
    )
    .toBe('done');

  const { faults, stop } = watchPage(page);
  await signIn(page, 'statistician');
  await page.goto(`${LAB}/analyses/${key}`);
  await expect(statementNumber(page)).toHaveText(/^<\d/);
  const shown = (await statementNumber(page).textContent()) ?? '';
  await expect(page.getByRole('img', { name: /^Posterior/ }).first()).toBeVisible();
  const levels = page.getByRole('table', { name: /^Upper limits by credible level/ });
  const row = levels.getByRole('row', { name: /^95/ });
  await expect(row.getByRole('cell').first()).toHaveText(shown.replace(/\s?%$/, ''));
  for (const title of ['Sensitivity', 'Detections', 'Which stars carry the limit', 'Provenance']) {
    await expect(page.getByRole('heading', { name: new RegExp(`^\\d${title}$`) })).toBeVisible();
  }
  await expect(page.getByRole('link', { name: 'Freeze' })).toHaveAttribute('href', /freeze/);
  await page.getByRole('button', { name: /^Export: files of run/ }).click();
  await expect(page.getByRole('dialog').getByRole('link', { name: 'CSV' }).first()).toBeVisible();
  stop();
  expect(faults).toEqual([]);
});
