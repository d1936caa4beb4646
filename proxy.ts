import { type NextRequest, NextResponse } from 'next/server';
import { config as readConfig } from '@/lib/config';

/** Only our own scripts run: those that carry this answer's nonce, and what they load. */
function contentSecurityPolicy(nonce: string, isProduction: boolean): string {
  const directives = [
    "default-src 'self'",
    // The development server evaluates code and puts its styles in by script.
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isProduction ? '' : " 'unsafe-eval'"}`,
    `style-src 'self' ${isProduction ? `'nonce-${nonce}'` : "'unsafe-inline'"}`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    `connect-src 'self'${isProduction ? '' : ' ws:'}`,
    "worker-src 'self' blob:",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ];
  return directives.join('; ');
}

/** Pages get their headers here; handlers of the API set their own, and uploads never come by. */
export function proxy(request: NextRequest): NextResponse {
  const { isProduction, webAddress } = readConfig();
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64');
  const policy = contentSecurityPolicy(nonce, isProduction);
  const forwarded = new Headers(request.headers);
  forwarded.set('x-nonce', nonce);
  forwarded.set('x-address', `${request.nextUrl.pathname}${request.nextUrl.search}`);
  forwarded.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers: forwarded } });
  response.headers.set('Content-Security-Policy', policy);
  response.headers.set('X-Content-Type-Options', 'nosniff');
  response.headers.set('Referrer-Policy', 'same-origin');
  response.headers.set('Cross-Origin-Opener-Policy', 'same-origin');
  response.headers.set(
    'Permissions-Policy',
    'camera=(), microphone=(), geolocation=(), payment=(), usb=()',
  );
  if (webAddress.startsWith('https://')) {
    response.headers.set('Strict-Transport-Security', 'max-age=31536000; includeSubDomains');
  }
  return response;
}

export const config = { matcher: ['/((?!api/|_next/static/).*)'] };
