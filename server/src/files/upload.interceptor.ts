import { Injectable, type CallHandler, type ExecutionContext, type NestInterceptor } from '@nestjs/common';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import { rm } from 'node:fs/promises';
import { finalize, type Observable } from 'rxjs';
import { fileLimits } from '@kerfyard/common/files';
import { AppError } from '../platform/http/app-error.ts';
import { Storage } from '../platform/storage/storage.ts';
import { IncomingFiles, type IncomingFile } from './incoming-files.ts';
import { uploadLimits } from './upload.limits.ts';

/** What is left open after a refusal is cut off a little later, so that the answer arrives before the line ends. */
const LINGER_MS = 1_000;

/**
 * Reads a multipart body of `files` and text fields, after the guards have let the request through. Limits hold while
 * reading: the length header is believed only when it already says too much.
 */
@Injectable()
export class UploadInterceptor implements NestInterceptor {
  private readonly read: ReturnType<ReturnType<typeof multer>['array']>;

  constructor(storage: Storage) {
    const upload = multer({
      storage: new IncomingFiles(storage),
      // Browsers send names in UTF-8; busboy would read them as Latin-1.
      defParamCharset: 'utf8',
      limits: {
        fieldNameSize: 50,
        fieldSize: uploadLimits.maxFieldBytes,
        fields: uploadLimits.maxFields,
        files: uploadLimits.maxParts - uploadLimits.maxFields,
        parts: uploadLimits.maxParts,
        headerPairs: 20,
        fieldNestingDepth: 0,
      },
    } as multer.Options);
    this.read = upload.array('files');
  }

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const request = context.switchToHttp().getRequest<Request>();
    const response = context.switchToHttp().getResponse<Response>();
    try {
      await this.receive(request, response);
    } catch (error) {
      await removeIncoming(request);
      if (!request.readableEnded) cutOff(request, response);
      throw error;
    }
    const files = (request.files ?? []) as unknown as IncomingFile[];
    const sent = files.map(({ originalname, sha256 }) => [originalname, sha256]);
    request.body = { ...(request.body as object), files: sent };
    return next.handle().pipe(finalize(() => void removeIncoming(request)));
  }

  private receive(request: Request, response: Response): Promise<void> {
    if (!request.is('multipart/form-data')) throw new AppError('wrong_type');
    if (Number(request.get('content-length') ?? 0) > uploadLimits.maxBodyBytes)
      throw new AppError('too_large');
    return new Promise((resolve, reject) => {
      const stall = setTimeout(() => settle(new AppError('unreadable_body')), uploadLimits.stallMs);
      let bytes = 0;
      const count = (chunk: Buffer) => {
        bytes += chunk.length;
        stall.refresh();
        if (bytes > uploadLimits.maxBodyBytes) settle(new AppError('too_large'));
      };
      const settle = (error: unknown) => {
        clearTimeout(stall);
        request.off('data', count);
        if (error === undefined || error === null) resolve();
        else reject(toAppError(error));
      };
      // The parser attaches in the same tick, so no chunk passes it by.
      request.on('data', count);
      void this.read(request, response, settle);
    });
  }
}

function toAppError(error: unknown): unknown {
  if (error instanceof AppError) return error;
  if (!(error instanceof MulterError)) return new AppError('unreadable_body');
  if (error.code === 'LIMIT_UNEXPECTED_FILE')
    return AppError.field(error.field ?? 'files', 'Send files under "files"');
  return new AppError(error.code.startsWith('LIMIT_') ? 'too_large' : 'unreadable_body');
}

function cutOff(request: Request, response: Response): void {
  response.set('Connection', 'close');
  response.once('finish', () => setTimeout(() => request.destroy(), LINGER_MS).unref());
}

async function removeIncoming(request: Request): Promise<void> {
  const files = (request.files ?? []) as unknown as IncomingFile[];
  await Promise.all(files.map((file) => (file.path === null ? null : rm(file.path, { force: true }))));
}

/** The files a request brought; at least one, else an input error. */
export function incomingFiles(request: Request): IncomingFile[] {
  const files = (request.files ?? []) as unknown as IncomingFile[];
  if (files.length === 0) throw AppError.field('files', `Choose 1 to ${fileLimits.maxFilesPerRequest} files`);
  return files;
}
