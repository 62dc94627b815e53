import { NextResponse, type NextRequest } from 'next/server';
import { nothingRuns } from '@/lib/web/file-policy';

/** Headers only: who may see what is decided in the data layer. A nonce for each answer; no inline script or style without it. */
export function proxy(request: NextRequest): NextResponse {
  const nonce = Buffer.from(crypto.randomUUID()).toString('base64');
  const development = process.env.NODE_ENV === 'development';
  const policy = [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? " 'unsafe-eval'" : ''}`,
    `style-src 'self' ${development ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ');
  const headers = new Headers(request.headers);
  headers.set('x-nonce', nonce);
  headers.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers } });
  // A header set here wins over the handler's own: data and files get the policy for what is never a page.
  response.headers.set('content-security-policy', request.nextUrl.pathname.startsWith('/api/') ? nothingRuns : policy);
  response.headers.set('x-content-type-options', 'nosniff');
  response.headers.set('referrer-policy', 'no-referrer');
  response.headers.set('x-frame-options', 'DENY');
  response.headers.set('permissions-policy', 'camera=(), microphone=(), geolocation=(), payment=()');
  response.headers.set('cross-origin-opener-policy', 'same-origin');
  response.headers.set('strict-transport-security', 'max-age=31536000');
  return response;
}

// Uploads stream past the proxy, which would cut a long body; they set their own headers.
export const config = { matcher: ['/((?!_next/static|_next/image|favicon.ico|api/consents/[^/]+/paper$).*)'] };
