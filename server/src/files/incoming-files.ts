import type { Request } from 'express';
import type { StorageEngine } from 'multer';
import { createHash } from 'node:crypto';
import { open, rm } from 'node:fs/promises';
import { fileLimits } from '@kerfyard/common/files';
import type { Storage } from '../platform/storage/storage.ts';

/** A file of the request as it lies in the incoming folder; without a path when it was over a limit. */
export interface IncomingFile {
  originalname: string;
  mimetype: string;
  path: string | null;
  /** Of the bytes as sent; null without a path. */
  sha256: string | null;
  overLimit: 'too_large' | 'too_many' | null;
}

type Received = Pick<IncomingFile, 'path' | 'sha256' | 'overLimit'>;

/**
 * Receives files to disk while counting: one over the size limit, or past the tenth, is read to its end and thrown
 * away, so that those beside it still arrive.
 */
export class IncomingFiles implements StorageEngine {
  private readonly counts = new WeakMap<Request, number>();

  constructor(private readonly storage: Storage) {}

  _handleFile(
    request: Request,
    file: Express.Multer.File,
    callback: (error?: unknown, info?: Partial<Express.Multer.File>) => void,
  ): void {
    const count = (this.counts.get(request) ?? 0) + 1;
    this.counts.set(request, count);
    const received = count > fileLimits.maxFilesPerRequest ? discard(file) : this.receive(file);
    received.then(
      (info) => callback(null, info as Partial<Express.Multer.File>),
      (error: unknown) => callback(error),
    );
  }

  _removeFile(_request: Request, file: Express.Multer.File, callback: (error: Error | null) => void): void {
    const { path } = file as unknown as IncomingFile;
    if (path === null || path === undefined) return callback(null);
    rm(path, { force: true }).then(
      () => callback(null),
      (error: Error) => callback(error),
    );
  }

  private async receive(file: Express.Multer.File): Promise<Received> {
    const path = this.storage.incomingPath();
    const handle = await open(path, 'wx', 0o600);
    const hash = createHash('sha256');
    let bytes = 0;
    try {
      for await (const chunk of file.stream as AsyncIterable<Buffer>) {
        bytes += chunk.length;
        if (bytes > fileLimits.maxBytes) continue;
        hash.update(chunk);
        await handle.writeFile(chunk);
      }
    } catch (error) {
      await rm(path, { force: true });
      throw error;
    } finally {
      await handle.close();
    }
    if (bytes <= fileLimits.maxBytes) return { path, sha256: hash.digest('hex'), overLimit: null };
    await rm(path, { force: true });
    return { path: null, sha256: null, overLimit: 'too_large' };
  }
}

async function discard(file: Express.Multer.File): Promise<Received> {
  file.stream.resume();
  await new Promise<void>((resolve, reject) => {
    file.stream.once('end', resolve);
    file.stream.once('error', reject);
    file.stream.once('close', resolve);
  });
  return { path: null, sha256: null, overLimit: 'too_many' };
}
