import { NextRequest } from 'next/server';
import { describe, expect, it } from 'vitest';
import { GET as health } from '@/app/api/health/route';
import { config, proxy } from '@/proxy';
import { withDatabase } from '../support/database';
import { webAddress } from '../support/people';

const { query } = withDatabase();
const page = (address: string, headers: Record<string, string> = {}) =>
  proxy(new NextRequest(`${webAddress()}${address}`, { headers }));

describe('the headers of a page', () => {
  it('let only scripts with this answer’s nonce run, and no frame around it', () => {
    const { headers } = page('/heron/surveys');
    const policy = headers.get('content-security-policy') ?? '';
    const nonce = /'nonce-([^']+)'/.exec(policy)?.[1];
    expect(Buffer.from(nonce ?? '', 'base64')).toHaveLength(16);
    expect(policy).toContain(`script-src 'self' 'nonce-${nonce}' 'strict-dynamic'`);
    for (const directive of [
      "default-src 'self'",
      "style-src-attr 'unsafe-inline'",
      "object-src 'none'",
      "base-uri 'none'",
      "form-action 'self'",
      "frame-ancestors 'none'",
    ]) {
      expect(policy.split('; ')).toContain(directive);
    }
    expect(policy).not.toMatch(/https?:|\*/);
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('referrer-policy')).toBe('same-origin');
    expect(headers.get('cross-origin-opener-policy')).toBe('same-origin');
    expect(headers.get('permissions-policy')).toContain('camera=()');
  });

  it('use each nonce once', () => {
    const policies = Array.from({ length: 20 }, () =>
      page('/').headers.get('content-security-policy'),
    );
    expect(new Set(policies).size).toBe(20);
  });

  it('tell the page its nonce and address, whatever the request claims', () => {
    const { headers } = page('/heron/people?tab=2', { 'x-nonce': 'mine', 'x-address': '/evil' });
    const nonce = headers.get('x-middleware-request-x-nonce');
    expect(headers.get('content-security-policy')).toContain(`'nonce-${nonce}'`);
    expect(headers.get('x-middleware-request-x-address')).toBe('/heron/people?tab=2');
  });

  it('leave the API alone, so that no upload is cut', () => {
    const matcher = new RegExp(`^${config.matcher[0]}$`);
    expect(matcher.test('/api/v1/collaborations/heron/uploads')).toBe(false);
    expect(matcher.test('/_next/static/chunk.js')).toBe(false);
    expect(matcher.test('/heron/surveys')).toBe(true);
    expect(matcher.test('/')).toBe(true);
  });
});

describe('GET /api/health', () => {
  it('answers from the database, and counts the workers that were heard of', async () => {
    expect(await (await health()).json()).toEqual({ status: 'ok', workers: 0 });
    await query(
      `insert into worker_heartbeat (worker_id, process_id, seen_at)
       values ('a', '1', now()), ('b', '2', now() - interval '1 minute')`,
    );
    const response = await health();
    expect(await response.json()).toEqual({ status: 'ok', workers: 1 });
    expect(response.headers.get('cache-control')).toBe('no-store');
  });
});
