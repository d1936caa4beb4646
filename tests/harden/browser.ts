import { existsSync } from 'node:fs';
import { type Browser, chromium, type Page } from '@playwright/test';
import { CHROMIUM, CHROMIUM_ARGUMENTS } from '../browser/chromium';
import type { RunningProduct } from './row';
import { signInOf } from './visitor';

const PATIENCE_MS = 120_000;

/** A browser with one page of the product, signed in through its form. */
export async function openLaboratory(
  product: RunningProduct,
  role: string,
): Promise<{ browser: Browser; page: Page; faults: string[] }> {
  if (!existsSync(CHROMIUM)) throw new Error(`${CHROMIUM} is missing; this row needs it`);
  const person = signInOf(product, role);
  const browser = await chromium.launch({
    executablePath: CHROMIUM,
    args: CHROMIUM_ARGUMENTS,
  });
  const context = await browser.newContext({
    baseURL: product.address,
    viewport: { width: 1440, height: 900 },
  });
  context.setDefaultTimeout(PATIENCE_MS);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(error.message));
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(person.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL('**/breakwater');
  return { browser, page, faults };
}

/** Drags a file over the page's drop zone and lets it go, as a person's hand does. */
export async function dropFile(page: Page, name: string, text: string): Promise<void> {
  const carried = await page.evaluateHandle(
    ([fileName, content]) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([content], fileName, { type: 'text/csv' }));
      return transfer;
    },
    [name, text],
  );
  // Its words change while something hangs over it; its name does not.
  const zone = page.getByLabel(/^Drop files of/);
  for (const type of ['dragenter', 'dragover', 'drop']) {
    await zone.dispatchEvent(type, { dataTransfer: carried });
  }
}
