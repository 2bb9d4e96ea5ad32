import { existsSync } from 'node:fs';
import { join } from 'node:path';
import type { NestExpressApplication } from '@nestjs/platform-express';
import type { NextFunction, Request, Response } from 'express';
import { compressedAssets } from './compressed-assets.ts';
import { PageHints } from './page-hints.ts';

const SERVER_PATHS = /^\/(?:api|socket\.io)(?:\/|$)/;
const HASHED = /[\\/]assets[\\/]/;

/** Serves the built client; every other page address gets its one page, which routes by itself. */
export function serveClient(app: NestExpressApplication, clientDist: string): void {
  const page = join(clientDist, 'index.html');
  const hints = new PageHints(clientDist);
  app.use(compressedAssets(clientDist));
  app.useStaticAssets(clientDist, {
    index: false,
    redirect: false,
    dotfiles: 'ignore',
    setHeaders: (response: Response, path: string) =>
      response.setHeader(
        'Cache-Control',
        // Names under assets/ carry the hash of their content.
        HASHED.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache',
      ),
  });
  app.use((request: Request, response: Response, next: NextFunction) => {
    const isPage = isPageRequest(request) && existsSync(page);
    if (!isPage) {
      next();
      return;
    }
    response.setHeader('Cache-Control', 'no-cache');
    const links = hints.linksFor(request.path, /-access=/.test(request.headers.cookie ?? ''));
    if (links !== '') response.setHeader('Link', links);
    response.sendFile(page, { dotfiles: 'allow' });
  });
}

function isPageRequest(request: Request): boolean {
  if (request.method !== 'GET' && request.method !== 'HEAD') return false;
  if (SERVER_PATHS.test(request.path)) return false;
  // A missing script must be missing, not a page; hidden files are nobody's page.
  const last = request.path.split('/').at(-1) ?? '';
  return !last.includes('.') && !request.path.includes('/.') && request.accepts('html') !== false;
}
