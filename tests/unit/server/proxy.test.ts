import { NextRequest } from 'next/server';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { proxy } from '../../../proxy';

afterEach(() => vi.unstubAllEnvs());
const answer = () => proxy(new NextRequest('https://pinloom.example/w/tarnbrook')).headers;
const policy = () => answer().get('content-security-policy') ?? '';

describe('every answer', () => {
  it('lets scripts run by a nonce that is new each time, of at least 128 bits', () => {
    const nonces = [policy(), policy()].map((text) => text.match(/'nonce-([^']+)'/)?.[1] ?? '');
    expect(new Set(nonces).size).toBe(2);
    expect(Buffer.from(nonces[0] ?? '', 'base64').length).toBeGreaterThanOrEqual(16);
    expect(policy()).toContain("'strict-dynamic'");
    expect(policy().match(/script-src [^;]*/)?.[0]).not.toMatch(/unsafe/);
  });

  it.each(["object-src 'none'", "base-uri 'none'", "frame-ancestors 'none'", "form-action 'self'"])(
    'has the policy %s (ASVS 5.0, 3.4.3 and 3.4.6)',
    (directive) => expect(policy()).toContain(directive),
  );

  it('forbids guessing of content types and embedding', () => {
    expect(answer().get('x-content-type-options')).toBe('nosniff');
    expect(answer().get('x-frame-options')).toBe('DENY');
  });

  it('demands TLS for at least a year (ASVS 5.0, 3.4.1), but not over plain http on a developer machine', () => {
    const seconds = Number(
      answer()
        .get('strict-transport-security')
        ?.match(/max-age=(\d+)/)?.[1],
    );
    expect(seconds).toBeGreaterThanOrEqual(365 * 86_400);
    vi.stubEnv('COOKIE_SECURE', '0');
    expect(answer().has('strict-transport-security')).toBe(false);
  });

  it('hands the nonce and an id for the log to the page, whatever the client sent', () => {
    const request = new NextRequest('https://pinloom.example/', { headers: { 'x-request-id': 'forged' } });
    const headers = proxy(request).headers;
    expect(headers.get('x-middleware-request-content-security-policy')).toBe(
      headers.get('content-security-policy'),
    );
    expect(headers.get('x-middleware-request-x-request-id')).toMatch(/^[A-Za-z0-9_-]{12}$/);
  });
});
