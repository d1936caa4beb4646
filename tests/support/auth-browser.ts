import { GET as authGet, POST as authPost } from '@/app/api/auth/[...nextauth]/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { POST as signUp } from '@/app/api/v1/sign-up/route';
import { call, webAddress } from './people';

export const PASSWORD = 'violet harbour anchor mosaic';

/** A browser as far as next-auth is concerned: it keeps cookies and fetches the CSRF token. */
export class Browser {
  readonly jar = new Map<string, string>();

  get cookie(): string {
    return [...this.jar].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  private keep(response: Response): Response {
    for (const line of response.headers.getSetCookie()) {
      const [pair] = line.split(';');
      const at = pair.indexOf('=');
      const value = pair.slice(at + 1);
      if (value === '') this.jar.delete(pair.slice(0, at));
      else this.jar.set(pair.slice(0, at), value);
    }
    return response;
  }

  async get(action: string): Promise<Response> {
    const request = new Request(`${webAddress()}/api/auth/${action}`, {
      headers: { cookie: this.cookie },
    });
    const nextauth = action.split('?')[0].split('/');
    return this.keep(await authGet(request, { params: Promise.resolve({ nextauth }) }));
  }

  async post(action: string, form: Record<string, string>): Promise<Response> {
    const { csrfToken } = (await (await this.get('csrf')).json()) as { csrfToken: string };
    const request = new Request(`${webAddress()}/api/auth/${action}`, {
      method: 'POST',
      headers: {
        cookie: this.cookie,
        'content-type': 'application/x-www-form-urlencoded',
        'user-agent': 'a browser',
      },
      body: new URLSearchParams({ csrfToken, json: 'true', ...form }),
    });
    return this.keep(
      await authPost(request, { params: Promise.resolve({ nextauth: action.split('/') }) }),
    );
  }

  signIn(email: string, password: string, callbackUrl = `${webAddress()}/`): Promise<Response> {
    return this.post('callback/credentials', { email, password, callbackUrl });
  }

  me(): Promise<Response> {
    return call(getMe, { headers: { cookie: this.cookie } });
  }
}

let count = 0;

/** Signs a new person up. @returns the address of their account */
export async function newAccount(): Promise<string> {
  count += 1;
  const email = `person-${count}@observatory.example`;
  const body = { name: 'Ruth Castellan', email, password: PASSWORD };
  const response = await call(signUp, { method: 'POST', body });
  if (response.status !== 201) throw new Error(`sign-up answered ${response.status}`);
  return email;
}

export async function signedIn(email: string): Promise<Browser> {
  const browser = new Browser();
  const response = await browser.signIn(email, PASSWORD);
  if (response.status !== 200) throw new Error(`sign-in answered ${response.status}`);
  return browser;
}
