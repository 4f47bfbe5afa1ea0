import { expect, it } from 'vitest';
import { startApp } from '../api/support/app.js';
import { makeClientFiles } from '../api/support/client-files.js';

const app = await startApp({ clientDir: makeClientFiles() });
const client = app.client();
const POLICY = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self' 'nonce-NONCE'",
  "img-src 'self' data:",
  "font-src 'self'",
  "connect-src 'self'",
  "worker-src 'self'",
  "frame-src 'self'",
  "manifest-src 'self'",
  "form-action 'self'",
  "base-uri 'none'",
  "frame-ancestors 'none'",
  "object-src 'none'",
].join(';');

/** All headers but those that differ with every answer; the nonce is replaced. */
function lasting(headers: Headers): Record<string, string> {
  const passing = new Set(['date', 'x-request-id', 'connection', 'keep-alive', 'content-length', 'transfer-encoding']);
  const kept = [...headers].filter(([name]) => !passing.has(name));
  return Object.fromEntries(kept.map(([name, value]) => [name, value.replace(/'nonce-[^']+'/, "'nonce-NONCE'")]));
}
const COMMON = {
  'content-security-policy': POLICY,
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'origin-agent-cluster': '?1',
  'referrer-policy': 'no-referrer',
  vary: 'Accept-Encoding',
  'x-content-type-options': 'nosniff',
  'x-dns-prefetch-control': 'off',
  'x-download-options': 'noopen',
  'x-frame-options': 'DENY',
  'x-permitted-cross-domain-policies': 'none',
  'x-xss-protection': '0',
};

it('sends a page of the app with exactly these headers', async () => {
  const { headers } = await client.get('/p/any/sheet/any');
  expect(lasting(headers)).toEqual({
    ...COMMON,
    'cache-control': 'no-store',
    'content-type': 'text/html; charset=utf-8',
  });
});

it('sends an answer of the API with exactly these headers', async () => {
  const { headers } = await client.get('/api/health');
  const own = { 'cache-control': 'no-store', 'content-type': 'application/json; charset=utf-8' };
  expect(lasting(headers)).toEqual({ ...COMMON, ...own });
});

it('asks for TLS from then on where people reach the server by TLS', async () => {
  const other = await startApp({ publicUrl: () => 'https://hummock.example', clientDir: makeClientFiles() });
  expect((await other.client().get('/')).headers.get('strict-transport-security')).toMatch(/^max-age=\d{8}/);
});

it('gives every page a nonce of its own, the same in header and document', async () => {
  const pages = await Promise.all([client.get('/'), client.get('/')]);
  const nonces = pages.map(({ headers, bytes }) => {
    const inHeader = /'nonce-([^']+)'/.exec(headers.get('content-security-policy') ?? '')?.[1] ?? '';
    expect(new TextDecoder().decode(bytes)).toContain(`nonce="${inHeader}"`);
    return inHeader;
  });
  expect(nonces[0]).toMatch(/^[\w+/]{22}==$/);
  expect(nonces[0]).not.toBe(nonces[1]);
});

it('does not say what it is made with', async () => {
  const { headers } = await client.get('/');
  expect(headers.get('x-powered-by')).toBeNull();
  expect(headers.get('server')).toBeNull();
});

it.each(['/.secret', '/assets/../.secret', '/%2e%2e/package.json', '/..%2fpackage.json', '/assets/%2e%2e/%2esecret'])(
  'does not hand out %s',
  async (path) => {
    const { status, bytes } = await client.get(path);
    expect(new TextDecoder().decode(bytes)).not.toMatch(/not for others|"name": "hummock"/);
    expect([200, 403, 404]).toContain(status); // 200: the page, which says that there is nothing here
  },
);
