import { readFile } from 'node:fs/promises';
import { extname, join } from 'node:path';
import { promisify } from 'node:util';
import { brotliCompress, constants, gzip } from 'node:zlib';
import type { NextFunction, Request, RequestHandler, Response } from 'express';

const ASSET = /^\/assets\/[\w.-]+\.(?:js|css|svg|json)$/;

const encoders: Record<string, (bytes: Buffer) => Promise<Buffer>> = {
  br: (bytes) =>
    promisify(brotliCompress)(bytes, {
      params: { [constants.BROTLI_PARAM_QUALITY]: 9, [constants.BROTLI_PARAM_SIZE_HINT]: bytes.length },
    }),
  gzip: (bytes) => promisify(gzip)(bytes, { level: 9 }),
};

/**
 * Answers requests for the client's hashed text files compressed (RFC 9110, section 8.4), each compressed once: their
 * names carry the hash of their content, so nothing kept goes stale. Answers of the API stay as they are, since
 * compressing secrets beside what a stranger chose tells their length.
 */
export function compressedAssets(clientDist: string): RequestHandler {
  const kept = new Map<string, Promise<Buffer | null>>();
  const compressed = (path: string, encoding: string): Promise<Buffer | null> => {
    const key = `${encoding} ${path}`;
    const found = kept.get(key);
    if (found !== undefined) return found;
    const made = readFile(join(clientDist, path)).then(encoders[encoding], () => null);
    kept.set(key, made);
    // A name that is no file is not remembered: strangers may ask for any number of them.
    void made.then((bytes) => bytes ?? kept.delete(key));
    return made;
  };
  return async (request: Request, response: Response, next: NextFunction): Promise<void> => {
    const isWhole = request.method === 'GET' && request.headers.range === undefined;
    const encoding = isWhole && ASSET.test(request.path) ? bestEncoding(request) : undefined;
    if (encoding === undefined) return next();
    const bytes = await compressed(request.path, encoding);
    if (bytes === null) return next();
    response.type(extname(request.path));
    response.set({
      'Content-Encoding': encoding,
      Vary: 'Accept-Encoding',
      'Cache-Control': 'public, max-age=31536000, immutable',
    });
    response.end(bytes);
  };
}

/** Ours is the order: a browser that takes both would be given gzip by its own. */
function bestEncoding(request: Request): string | undefined {
  return Object.keys(encoders).find((name) => request.acceptsEncodings(name) !== false);
}
