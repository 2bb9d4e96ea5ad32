import type { FileKind, UploadResult } from '@kerfyard/common/files';
import { CSRF_HEADER, withSession } from './api-client.ts';
import { errorFromBody, offlineError } from './api-error.ts';

interface UploadOptions {
  kind: FileKind;
  /** One per file, made when it was chosen: sent again after a lost answer, it is still one file. */
  idempotencyKey: string;
  signal: AbortSignal;
  /** Share sent so far, 0 to 1. */
  onProgress: (share: number) => void;
}

/**
 * Send one file. `XMLHttpRequest`, because only it tells how much has been sent.
 * @throws ApiError as every request; an aborted one rejects with an `AbortError`
 */
export function uploadFile(file: File, options: UploadOptions): Promise<UploadResult> {
  return withSession(() => sendFile(file, options));
}

function sendFile(file: File, options: UploadOptions): Promise<UploadResult> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const form = new FormData();
    // The kind goes first: the server reads the parts in order and must know it before the bytes come.
    form.append('kind', options.kind);
    form.append('files', file, file.name);
    request.open('POST', '/api/files');
    request.setRequestHeader(CSRF_HEADER, '1');
    request.setRequestHeader('Idempotency-Key', options.idempotencyKey);
    request.upload.onprogress = (event) => {
      if (event.lengthComputable) options.onProgress(event.loaded / event.total);
    };
    request.onload = () => {
      const body = readJson(request.responseText);
      if (request.status >= 200 && request.status < 300) resolve(body as UploadResult);
      else reject(errorFromBody(request.status, body));
    };
    request.onerror = () => reject(offlineError());
    request.onabort = () => reject(new DOMException('The upload was cancelled', 'AbortError'));
    options.signal.addEventListener('abort', () => request.abort(), { once: true });
    request.send(form);
  });
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}
