/** Runs before every page and route: security headers, the policy's nonce and an id for the log. */
import { randomBytes } from 'node:crypto';
import { type NextRequest, NextResponse } from 'next/server';

const development = process.env.NODE_ENV === 'development';
const secure = () => process.env.COOKIE_SECURE !== '0';

/** Scripts only with this answer's nonce, or loaded by one that has it. */
function contentSecurityPolicy(nonce: string): string {
  return [
    "default-src 'self'",
    // The development server evaluates the modules that it reloads.
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? " 'unsafe-eval'" : ''}`,
    // The canvas library sets inline styles to place nodes.
    "style-src 'self' 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    `connect-src 'self'${development ? ' ws: wss:' : ''}`,
    "worker-src 'self' blob:",
    "object-src 'none'",
    "base-uri 'none'",
    "frame-src 'none'",
    "frame-ancestors 'none'",
    "form-action 'self'",
    ...(secure() && !development ? ['upgrade-insecure-requests'] : []),
  ].join('; ');
}

export function proxy(request: NextRequest): NextResponse {
  const policy = contentSecurityPolicy(randomBytes(16).toString('base64'));
  const headers = new Headers(request.headers);
  // Next reads the nonce from the request's policy and puts it on its own scripts.
  headers.set('content-security-policy', policy);
  headers.set('x-request-id', randomBytes(9).toString('base64url'));
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  response.headers.set('x-content-type-options', 'nosniff');
  response.headers.set('x-frame-options', 'DENY');
  response.headers.set('referrer-policy', 'strict-origin-when-cross-origin');
  response.headers.set('cross-origin-opener-policy', 'same-origin');
  response.headers.set(
    'permissions-policy',
    'camera=(), microphone=(), geolocation=(), payment=(), usb=(), browsing-topics=()',
  );
  if (secure()) response.headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
  return response;
}

export const config = {
  matcher: [{ source: '/((?!_next/static|_next/image|icon.svg|fonts/).*)' }],
};
