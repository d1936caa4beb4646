import { readFileSync } from 'node:fs';
import path from 'node:path';
import { type ConsoleMessage, expect, type Page, type Request } from '@playwright/test';
import { LAB } from './screens';

export { LAB };

/** A file of the project, for an upload. */
export const projectFile = (name: string) => path.resolve(__dirname, '../..', name);

interface SignIn {
  role: string;
  email: string;
  password: string;
}

/** The sign-in that the seed made for a role. */
export function signInOf(role: string): SignIn {
  const folder = process.env.RAREBOUND_DATA_DIR;
  if (!folder) throw new Error('RAREBOUND_DATA_DIR is not set; run with: npm test -- browser');
  const all: SignIn[] = JSON.parse(
    readFileSync(path.join(folder, 'demo-sign-ins.json'), 'utf8'),
  ) as SignIn[];
  const found = all.find((one) => one.role === role);
  if (!found) throw new Error(`the seed wrote no sign-in of a ${role}`);
  return found;
}

/** Signs in through the form and waits for the overview. */
export async function signIn(page: Page, role: string): Promise<void> {
  const { email, password } = signInOf(role);
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL(`**${LAB}`);
  await expect(page.getByRole('heading', { level: 1, name: 'Breakwater' })).toBeVisible();
}

/** The large number of the plate, such as "<5.8 %". */
export const statementNumber = (page: Page) => page.locator('#statement .statement-number');

/** Collects what a page must not do: complain, break its content policy, ask another host. */
export function watchPage(page: Page): { faults: string[]; stop: () => void } {
  const faults: string[] = [];
  const ours = new URL(process.env.BASE_URL ?? '').origin;
  const onMessage = (message: ConsoleMessage) => {
    if (message.type() === 'error') faults.push(message.text());
  };
  const onError = (error: Error) => faults.push(error.message);
  const onRequest = (request: Request) => {
    const address = new URL(request.url());
    const isLocal = ['data:', 'blob:'].includes(address.protocol);
    if (!isLocal && address.origin !== ours) faults.push(`asked ${address.host}`);
  };
  page.on('console', onMessage);
  page.on('pageerror', onError);
  page.on('request', onRequest);
  const stop = () => {
    page.off('console', onMessage);
    page.off('pageerror', onError);
    page.off('request', onRequest);
  };
  return { faults, stop };
}
