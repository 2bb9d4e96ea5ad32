import { once } from 'node:events';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, request, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import express from 'express';
import { compressedAssets } from './compressed-assets.ts';
import { PageHints } from './page-hints.ts';

const folder = mkdtempSync(join(tmpdir(), 'kerfyard-client-'));
const script = `export const words = ${JSON.stringify('kerf '.repeat(500))};`;
let server: Server;

beforeAll(async () => {
  mkdirSync(join(folder, 'assets'));
  mkdirSync(join(folder, '.vite'));
  writeFileSync(join(folder, 'assets/app-1a2b.js'), script);
  writeFileSync(join(folder, 'secret.js'), 'no asset');
  writeFileSync(
    join(folder, '.vite/manifest.json'),
    JSON.stringify({
      'src/routes/scopes-page.tsx': {
        file: 'assets/scopes-page-1.js',
        css: ['assets/scopes-page-1.css'],
        imports: ['_start.js'],
      },
      '_start.js': { file: 'assets/start-1.js', imports: ['src/routes/scopes-page.tsx'] },
      'src/locales/en/scopes.json': { file: 'assets/scopes-2.js' },
    }),
  );
  const app = express();
  app.use(compressedAssets(folder));
  app.use(express.static(folder));
  server = createServer(app).listen(0, '127.0.0.1');
  await once(server, 'listening');
});
afterAll(() => {
  server.close();
  rmSync(folder, { recursive: true });
});

async function ask(path: string, headers: Record<string, string>, method = 'GET') {
  const { port } = server.address() as AddressInfo;
  const asking = request({ host: '127.0.0.1', port, path, headers, method }).end();
  const [answer] = (await once(asking, 'response')) as [
    AsyncIterable<Buffer> & { statusCode: number; headers: IncomingHttpHeaders },
  ];
  const parts: Buffer[] = [];
  for await (const part of answer) parts.push(part);
  return { status: answer.statusCode, headers: answer.headers, bytes: Buffer.concat(parts) };
}

describe('files of the client', () => {
  it('go out compressed as the browser can read them, with their type and for a year', async () => {
    const best = await ask('/assets/app-1a2b.js', { 'accept-encoding': 'gzip, deflate, br' });
    expect(best.headers).toMatchObject({
      'content-encoding': 'br',
      vary: 'Accept-Encoding',
      'cache-control': 'public, max-age=31536000, immutable',
    });
    expect(best.headers['content-type']).toMatch(/^(text|application)\/javascript/);
    expect(brotliDecompressSync(best.bytes).toString()).toBe(script);
    expect(best.bytes.length).toBeLessThan(script.length / 10);
    const older = await ask('/assets/app-1a2b.js', { 'accept-encoding': 'gzip' });
    expect(older.headers['content-encoding']).toBe('gzip');
    expect(gunzipSync(older.bytes).toString()).toBe(script);
  });

  it('go out as they are where that was not asked for, or in parts; other files and missing ones are not touched', async () => {
    const cases: [string, Record<string, string>, number][] = [
      ['/assets/app-1a2b.js', {}, 200],
      ['/assets/app-1a2b.js', { 'accept-encoding': 'gzip', range: 'bytes=0-9' }, 206],
      ['/secret.js', { 'accept-encoding': 'br' }, 200],
      ['/assets/none.js', { 'accept-encoding': 'br' }, 404],
      ['/assets/..%2fsecret.js', { 'accept-encoding': 'br' }, 200],
    ];
    for (const [path, headers, status] of cases) {
      const answer = await ask(path, headers);
      expect([path, answer.status, answer.headers['content-encoding']]).toEqual([path, status, undefined]);
    }
  });
});

describe('what a page will ask for next', () => {
  it('is told by the name its address begins with: code, styles, words, and who is signed in', () => {
    const hints = new PageHints(folder);
    expect(hints.linksFor('/scopes/0199', true).split(', ')).toEqual([
      '</assets/scopes-page-1.js>; rel=modulepreload',
      '</assets/scopes-page-1.css>; rel=preload; as=style; crossorigin',
      '</assets/start-1.js>; rel=modulepreload',
      '</assets/scopes-2.js>; rel=modulepreload',
      '</api/auth/me>; rel=preload; as=fetch; crossorigin',
    ]);
  });

  it('is nothing for a page unknown or a client without a manifest', () => {
    expect(new PageHints(folder).linksFor('/elsewhere', false)).toBe('');
    expect(new PageHints(folder).linksFor('/', false)).toBe('');
    expect(new PageHints(join(folder, 'none')).linksFor('/scopes', false)).toBe('');
  });
});
