/** What next-auth asks of the answer that it writes to, gathered into a web Response. */
export class CollectedAnswer {
  private statusCode = 200;
  private readonly headers = new Headers({
    'Cache-Control': 'no-store',
    'X-Content-Type-Options': 'nosniff',
  });
  private body: string | null = null;

  status(code: number): this {
    this.statusCode = code;
    return this;
  }

  getHeader(name: string): string | string[] | undefined {
    if (name.toLowerCase() === 'set-cookie') return this.headers.getSetCookie();
    return this.headers.get(name) ?? undefined;
  }

  setHeader(name: string, value: string | readonly string[]): this {
    this.headers.delete(name);
    for (const one of typeof value === 'string' ? [value] : value) this.headers.append(name, one);
    return this;
  }

  json(value: unknown): this {
    this.headers.set('Content-Type', 'application/json');
    this.body = JSON.stringify(value);
    return this;
  }

  send(value: unknown): this {
    if (typeof value === 'object' && value !== null) return this.json(value);
    if (!this.headers.has('Content-Type')) this.headers.set('Content-Type', 'text/plain');
    this.body = value === undefined ? null : String(value);
    return this;
  }

  end(): this {
    return this;
  }

  toResponse(): Response {
    return new Response(this.body, { status: this.statusCode, headers: this.headers });
  }
}
