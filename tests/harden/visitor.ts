import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { RunningProduct } from './row';

export interface SignIn {
  role: string;
  email: string;
  password: string;
}

/** How the person of a role signs in, as the seed wrote it. */
export function signInOf(product: RunningProduct, role: string): SignIn {
  const file = path.join(product.folder, 'demo-sign-ins.json');
  const all: SignIn[] = JSON.parse(readFileSync(file, 'utf8'));
  const found = all.find((one) => one.role === role);
  if (!found) throw new Error(`the seed wrote no sign-in of a ${role}`);
  return found;
}

const cookiesIn = (response: Response) =>
  response.headers.getSetCookie().map((line) => line.slice(0, line.indexOf(';')));

/** One attempt to sign in with a password, as the form makes it. */
export async function tryToSignIn(
  product: RunningProduct,
  fields: Record<string, string>,
  headers: Record<string, string> = {},
): Promise<Response> {
  const csrf = await fetch(`${product.address}/api/auth/csrf`, { headers });
  const { csrfToken } = (await csrf.json()) as { csrfToken: string };
  return fetch(`${product.address}/api/auth/callback/credentials`, {
    method: 'POST',
    redirect: 'manual',
    headers: {
      ...headers,
      cookie: cookiesIn(csrf).join('; '),
      origin: product.address,
      'content-type': 'application/x-www-form-urlencoded',
    },
    body: new URLSearchParams({ ...fields, csrfToken, json: 'true' }),
  });
}

/** @returns the cookie of a new session */
export async function signedIn(
  product: RunningProduct,
  { email, password }: Pick<SignIn, 'email' | 'password'>,
  headers: Record<string, string> = {},
): Promise<string> {
  const answer = await tryToSignIn(product, { email, password }, headers);
  const cookie = cookiesIn(answer).find((one) => /rarebound\.session=./.test(one));
  if (!cookie) throw new Error(`${email} could not sign in: ${answer.status}`);
  return cookie;
}
