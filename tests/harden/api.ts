import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { UploadKind } from '@/lib/formats';
import type { RunningProduct } from './row';

const DEMONSTRATION = 'breakwater';
const ATTEMPTS = 20;

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Any answer but a good one. */
export class Refused extends Error {
  constructor(
    route: string,
    readonly status: number,
    readonly text: string,
  ) {
    super(`${route}: ${status} ${text}`);
  }
}

/** The product as a program sees it: with a token, by default the one that the seed wrote. */
export class Api {
  private readonly token: string;

  constructor(
    private readonly product: Pick<RunningProduct, 'address' | 'folder'>,
    token?: string,
    private readonly lab = DEMONSTRATION,
  ) {
    this.token = token ?? readFileSync(path.join(product.folder, 'demo-token'), 'utf8').trim();
  }

  /** @throws Refused with the problem document of any refusal but "too many", which is waited for */
  async ask(route: string, init: RequestInit = {}): Promise<Response> {
    const address = `${this.product.address}/api/v1/collaborations/${this.lab}/${route}`;
    for (let attempt = 1; ; attempt++) {
      const response = await fetch(address, {
        ...init,
        headers: { authorization: `Bearer ${this.token}`, ...init.headers },
      });
      if (response.ok) return response;
      const isCrowd = response.status === 429 && attempt < ATTEMPTS;
      if (!isCrowd) throw new Refused(route, response.status, await response.text());
      await pause(1000 * Number(response.headers.get('retry-after') ?? 5));
    }
  }

  async read<Answer>(route: string): Promise<Answer> {
    return (await (await this.ask(route)).json()) as Answer;
  }

  async post<Answer>(route: string, body: unknown): Promise<Answer> {
    const response = await this.ask(route, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(body),
    });
    return (await response.json()) as Answer;
  }

  /** Sends a file with its SHA-256. */
  async upload(
    kind: UploadKind,
    survey: string,
    name: string,
    bytes: Uint8Array<ArrayBuffer>,
  ): Promise<{ id: string; sha256: string; report: { summary: string } }> {
    const digest = createHash('sha256').update(bytes).digest('base64');
    const query = new URLSearchParams({ kind, survey, name });
    const response = await this.ask(`uploads?${query}`, {
      method: 'POST',
      headers: {
        'content-type': 'application/octet-stream',
        'repr-digest': `sha-256=:${digest}:`,
      },
      body: bytes,
    });
    return await response.json();
  }

  store(upload: string): Promise<{ state: string }> {
    return this.post(`uploads/${upload}/store`, {});
  }
}
