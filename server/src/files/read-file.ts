import { create as contentDisposition } from 'content-disposition';
import { Injectable } from '@nestjs/common';
import type { Readable } from 'node:stream';
import type { Actor } from '@kerfyard/common/people';
import { AppError } from '../platform/http/app-error.ts';
import { Storage } from '../platform/storage/storage.ts';
import { FileAccess } from './file-access.ts';
import { FilesService } from './files.service.ts';
import type { FileQuery } from './upload.schema.ts';

export interface ReadableFile {
  etag: string;
  headers: Record<string, string>;
  open(): Promise<{ stream: Readable; bytes: number }>;
}

/** Serves a stored file to those who may read it. */
@Injectable()
export class ReadFile {
  constructor(
    private readonly files: FilesService,
    private readonly access: FileAccess,
    private readonly storage: Storage,
  ) {}

  /** @throws AppError 404 for unknown and foreign ids alike, and for the thumbnail of what has none */
  async run(actor: Actor, fileId: string, size: FileQuery['size']): Promise<ReadableFile> {
    const row = (await this.files.rows(null, [fileId])).get(fileId);
    const mayRead =
      row !== undefined && (await this.access.mayRead(actor, { id: row.id, companyId: row.company_id }));
    if (row === undefined || !mayRead) throw new AppError('not_found');
    const sha256 = size === 'thumb' ? row.thumbnail_sha256 : row.sha256;
    if (sha256 === null) throw new AppError('not_found');
    const type = size === 'thumb' ? 'image/webp' : row.type;
    return {
      etag: `"${sha256}"`,
      headers: {
        ETag: `"${sha256}"`,
        'Content-Type': type,
        // Pictures are drawn again by us and may show in a page; anything else only downloads.
        'Content-Disposition': contentDisposition(row.name, {
          type: type.startsWith('image/') ? 'inline' : 'attachment',
        }),
        'X-Content-Type-Options': 'nosniff',
        'Content-Security-Policy': "default-src 'none'; sandbox",
        'Cross-Origin-Resource-Policy': 'same-origin',
        // Kept by the browser, shown again only after we were asked: access can end.
        'Cache-Control': 'private, no-cache',
      },
      open: () => this.storage.stream(sha256),
    };
  }
}
