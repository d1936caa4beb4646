import { addMember, type Newcomer } from './laboratory-rows';
import { LAB } from './load-addresses';
import type { RunningProduct } from './row';
import { signedIn, tryToSignIn } from './visitor';

const PASSWORD = 'seven lanterns over a quiet harbour';
let count = 0;

/** Somebody at an address of their own, with an account and a token of their own. */
export class Visitor {
  private cookie: Promise<string> | undefined;
  readonly password = PASSWORD;
  private readonly number = ++count;

  private constructor(
    readonly product: RunningProduct,
    readonly account: Newcomer,
  ) {}

  static async arrive(product: RunningProduct): Promise<Visitor> {
    return new Visitor(product, await addMember(product, LAB, ['owner', 'statistician'], PASSWORD));
  }

  /** One of this visitor's addresses. */
  from(place = 0): Record<string, string> {
    return { 'x-forwarded-for': `10.${this.number}.${place >> 8}.${place & 255}` };
  }

  /** With the token, within the collaboration. */
  byToken(method: string, route: string, body?: unknown): Promise<Response> {
    return this.send(method, `/api/v1/collaborations/${LAB}/${route}`, body, {
      authorization: `Bearer ${this.account.token}`,
    });
  }

  /** With the cookie of a session, as a page asks. */
  async bySession(method: string, address: string, body?: unknown): Promise<Response> {
    this.cookie ??= signedIn(this.product, this.signInFields(), this.from());
    const cookie = await this.cookie;
    return this.send(method, address, body, { cookie, origin: this.product.address });
  }

  /** @throws Error unless the answer is a right one */
  async readBySession<Answer>(address: string, body: unknown): Promise<Answer> {
    const answer = await this.bySession('POST', address, body);
    if (!answer.ok) throw new Error(`${address}: ${answer.status} ${await answer.text()}`);
    return (await answer.json()) as Answer;
  }

  /** As nobody. */
  openly(method: string, address: string, body?: unknown, place = 0): Promise<Response> {
    return this.send(method, address, body, this.from(place));
  }

  signIn(fields: Record<string, string>, place = 0): Promise<Response> {
    return tryToSignIn(this.product, { ...this.signInFields(), ...fields }, this.from(place));
  }

  private signInFields() {
    return { email: this.account.email, password: this.password };
  }

  private async send(
    method: string,
    address: string,
    body: unknown,
    headers: Record<string, string>,
  ): Promise<Response> {
    const json =
      body === undefined
        ? {}
        : { body: JSON.stringify(body), type: { 'content-type': 'application/json' } };
    return fetch(this.product.address + address, {
      method,
      body: json.body ?? null,
      headers: { ...this.from(), ...json.type, ...headers },
    });
  }
}
