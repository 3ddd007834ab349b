import request from 'supertest';
import { describe, expect, inject, it } from 'vitest';

const server = request(inject('baseUrl'));

const nonceOf = (policy: string | undefined): string | undefined => /'nonce-([^']+)'/.exec(policy ?? '')?.[1];

describe('headers of every answer', () => {
  it.each(['/sign-in', '/api/v1/health', '/no-such-page'])(
    '%s cannot be framed, guessed at or told on',
    async (path) => {
      const { headers } = await server.get(path);
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['x-frame-options']).toBe('DENY');
      expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
      expect(headers['referrer-policy']).toBe('same-origin');
      expect(headers['x-powered-by']).toBeUndefined();
    },
  );

  it('lets a page run only the scripts that carry the number of this one answer', async () => {
    const [first, second] = await Promise.all([server.get('/sign-in'), server.get('/sign-in')]);
    const nonce = nonceOf(first.headers['content-security-policy']);
    expect(nonce).toBeDefined();
    expect(nonce).not.toBe(nonceOf(second.headers['content-security-policy']));
    const scripts = first.text.match(/<script\b[^>]*>/g) ?? [];
    expect(scripts.length).toBeGreaterThan(0);
    expect(scripts.filter((tag) => !tag.includes(`nonce="${nonce}"`))).toEqual([]);
  });

  it('lets an answer of the HTTP interface load nothing', async () => {
    const { headers } = await server.get('/api/v1/health');
    expect(headers['content-security-policy']).toBe("default-src 'none'; frame-ancestors 'none'");
  });
});
